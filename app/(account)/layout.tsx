import type { ReactNode } from 'react';

// Rendered for each request: its scripts carry the nonce of the page's policy.
export const dynamic = 'force-dynamic';

export default function AccountLayout({ children }: { readonly children: ReactNode }) {
  return <main className="mx-auto max-w-md px-4 pt-12 pb-16">{children}</main>;
}
