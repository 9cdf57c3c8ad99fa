import type { ReactNode } from 'react';
import { ThemeSwitch } from '@/components/ui/theme-switch';

// Rendered for each request: its scripts carry the nonce of the page's policy.
export const dynamic = 'force-dynamic';

export default function AccountLayout({ children }: { readonly children: ReactNode }) {
  return (
    <div className="mx-auto max-w-md px-4 pb-16">
      <header className="flex justify-end py-3"><ThemeSwitch /></header>
      <main>{children}</main>
    </div>
  );
}
