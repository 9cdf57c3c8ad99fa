import { meSchema, presentMe } from '@/lib/server/present-me';
import { route } from '@/lib/server/route';

export const GET = route({ access: 'signed-in', reply: meSchema }, ({ user }) => presentMe(user));
