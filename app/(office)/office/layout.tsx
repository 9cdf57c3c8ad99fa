import type { Metadata } from 'next';
import { headers } from 'next/headers';
import Link from 'next/link';
import { redirect } from 'next/navigation';
import type { ReactNode } from 'react';
import { getUser } from '@/lib/server/auth';
import { SignOutButton } from './_components/sign-out-button';
import { ThemeSwitch } from '@/components/ui/theme-switch';

export const metadata: Metadata = { title: 'Office' };
// Rendered for each request: its scripts carry the nonce of the page's policy.
export const dynamic = 'force-dynamic';

export default async function OfficeLayout({ children }: { readonly children: ReactNode }) {
  const user = await getUser({ headers: await headers() });
  if (!user) redirect('/signin?callbackUrl=/office');
  return (
    <div className="mx-auto max-w-7xl px-4 pb-16">
      <header className="book-head flex flex-wrap items-baseline gap-x-6 gap-y-1 py-3">
        <Link href="/office" className="text-xl font-bold tracking-tight">Lammas <span className="font-normal text-ink-soft">office</span></Link>
        <nav aria-label="You" className="ml-auto flex flex-wrap items-baseline gap-x-2">
          <span className="text-ink-soft">{user.name}</span>
          <a href="/field" className="px-2 underline decoration-bronze underline-offset-4">Field</a>
          <ThemeSwitch />
          <SignOutButton />
        </nav>
      </header>
      <main>{children}</main>
    </div>
  );
}
