'use client';

/** A quiet line: the new version comes in when the person says so, never by itself. */
export function UpdateLine({ use }: { readonly use: () => void }) {
  return (
    <div role="status" className="fixed inset-x-0 bottom-0 z-20 flex items-center justify-center gap-2 border-t-2 border-bronze bg-paper-raised px-4">
      <span>New version ready</span>
      <button type="button" onClick={use} className="min-h-target min-w-target cursor-pointer px-3 font-bold underline decoration-bronze decoration-2 underline-offset-4">use it</button>
    </div>
  );
}
