import { readHealth } from '@/lib/server/present-health';
import { route } from '@/lib/server/route';

export const dynamic = 'force-dynamic';

export const GET = route({ access: 'public' }, readHealth);
