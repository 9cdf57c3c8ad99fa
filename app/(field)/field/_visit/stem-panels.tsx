'use client';
import { Button } from '@/components/ui/button';
import { stemFormSchema, stemStatusSchema } from '@/lib/schema/field';
import type { StemMeasurement } from '@/lib/schema/field';
import { formWords, statusWords } from '../_data/words';

type Form = Pick<StemMeasurement, 'status' | 'form'>;

/** Live or dead; whole, broken, forked or leaning. */
export function FormPanel({ status, form, change, close }: Form & { readonly change: (form: Form) => void; readonly close: () => void }) {
  return (
    <section aria-label="Status and form of the stem" className="space-y-3 rounded-lg border-2 border-bronze bg-paper-raised p-3">
      <div role="group" aria-label="Status" className="grid grid-cols-2 gap-2">
        {stemStatusSchema.options.map((option) => (
          <Button key={option} kind={option === status ? 'main' : 'plain'} aria-pressed={option === status} onClick={() => change({ status: option, form })}>{statusWords[option]}</Button>
        ))}
      </div>
      <div role="group" aria-label="Form" className="grid grid-cols-2 gap-2">
        {stemFormSchema.options.map((option) => (
          <Button key={option} kind={option === form ? 'main' : 'plain'} aria-pressed={option === form} onClick={() => change({ status, form: option })}>{formWords[option]}</Button>
        ))}
      </div>
      <Button kind="quiet" className="w-full" onClick={close}>Back to the digits</Button>
    </section>
  );
}

export type TagChoice = { readonly stemId: string; readonly label: string };

/** Which tree stands on the card: one that an earlier visit knows, or a new one. */
export function TagPanel({ known, newTag, choose, chooseNew, close }: {
  readonly known: readonly TagChoice[]; readonly newTag: string;
  readonly choose: (stemId: string) => void; readonly chooseNew: () => void; readonly close: () => void;
}) {
  return (
    <section aria-label="Which tree" className="space-y-3 rounded-lg border-2 border-bronze bg-paper-raised p-3">
      {known.length > 0 && <p className="font-bold">Known from an earlier visit, not measured yet</p>}
      <div className="grid max-h-56 grid-cols-4 gap-2 overflow-y-auto">
        {known.map(({ stemId, label }) => <Button key={stemId} className="digits px-1" aria-label={`Tree ${label}`} onClick={() => choose(stemId)}>{label}</Button>)}
      </div>
      <Button kind="main" className="w-full" onClick={chooseNew}>New tree, tag {newTag}</Button>
      <Button kind="quiet" className="w-full" onClick={close}>Back to the digits</Button>
    </section>
  );
}
