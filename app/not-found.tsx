import Link from 'next/link';

export default function NotFound() {
  return (
    <main className="mx-auto max-w-xl px-4 pt-16">
      <h1 className="book-head pb-2 text-2xl font-bold">There is nothing at this address</h1>
      <p className="pt-4">It may have moved, or it belongs to a project that you are not a member of. <Link href="/office" className="underline decoration-bronze underline-offset-4">Go to your projects</Link>.</p>
    </main>
  );
}
