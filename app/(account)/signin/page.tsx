import type { Metadata } from 'next';
import { SignInForm } from './_components/sign-in-form';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage({ searchParams }: { readonly searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { callbackUrl } = await searchParams;
  // Only ways inside this site.
  const next = typeof callbackUrl === 'string' && /^\/(?![/\\])/.test(callbackUrl) ? callbackUrl : '/office';
  return (
    <>
      <h1 className="book-head pb-2 text-2xl font-bold">Lammas <span className="font-normal text-ink-soft">sign in</span></h1>
      <SignInForm next={next} />
      <p className="pt-8 text-ink-soft">Crews sign in on their phone at <a className="underline decoration-bronze underline-offset-4" href="/field">the field page</a>, once, with network.</p>
    </>
  );
}
