'use client';
import { useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { acceptReasonSchema } from '@/lib/schema/field';
import type { AcceptReason } from '@/lib/schema/field';
import { reasonWords } from '../_data/words';

/** The second reading differs: two large choices tell a tape from a slip. */
export function OriginPanel({ first, second, choose }: { readonly first: string; readonly second: string; readonly choose: (origin: 'again' | 'retyped') => void }) {
  return (
    <section aria-label="Where the new value comes from" className="space-y-2 rounded-lg border-2 border-bronze bg-paper-raised p-3">
      <p role="alert" className="text-lg leading-tight">
        First <b className="digits">{first}</b>, now <b className="digits">{second}</b>. How did it come?
      </p>
      <Button size="large" kind="main" className="w-full" onClick={() => choose('again')}>Measured again at the tree</Button>
      <Button size="large" className="w-full" onClick={() => choose('retyped')}>Misheard or mistyped</Button>
    </section>
  );
}

/** Why a doubted value is kept: one tap each, with room for a note. */
export function ReasonPanel({ accept, back }: { readonly accept: (reason: AcceptReason, note: string) => void; readonly back: () => void }) {
  const [note, setNote] = useState('');
  const id = useId();
  return (
    <section aria-label="Why the value is kept" className="space-y-2 rounded-lg border-2 border-doubt bg-paper-raised p-3">
      <p className="text-lg font-bold">Keep it, because</p>
      <div className="grid grid-cols-2 gap-2">
        {acceptReasonSchema.options.filter((reason) => reason !== 'other').map((reason) => (
          <Button key={reason} className="px-2" onClick={() => accept(reason, note)}>{reasonWords[reason]}</Button>
        ))}
      </div>
      <label htmlFor={id} className="block font-bold">Note</label>
      <input id={id} value={note} maxLength={500} onChange={(event) => setNote(event.target.value)} className="min-h-target w-full rounded-lg border-2 border-ink-faint bg-paper px-3 text-lg text-ink" />
      <div className="grid grid-cols-2 gap-2">
        <Button className="px-2" disabled={note.trim() === ''} onClick={() => accept('other', note)}>{reasonWords.other}</Button>
        <Button kind="quiet" className="px-2" onClick={back}>Back to the doubt</Button>
      </div>
    </section>
  );
}
