'use client';

export default function ErrorPage({ reset }: { readonly error: Error; readonly reset: () => void }) {
  return (
    <main className="mx-auto max-w-xl px-4 pt-16">
      <h1 className="book-head pb-2 text-2xl font-bold">This page could not be made</h1>
      <p className="pt-4">What was recorded is safe. Try again; if it stays like this, tell your administrator when it happened.</p>
      <button type="button" onClick={reset} className="mt-4 min-h-12 cursor-pointer rounded-lg border-2 border-bronze-strong bg-bronze px-4 font-bold text-bronze-on">Try again</button>
    </main>
  );
}
