'use client';
import { useId } from 'react';

type Props = { readonly label: string; readonly value: string; readonly options: readonly (readonly [string, string])[]; readonly change: (value: string) => void };

/** A choice with its label, sized for a desk. */
export function Select({ label, value, options, change }: Props) {
  const id = useId();
  return (
    <div>
      <label htmlFor={id} className="block text-sm font-bold">{label}</label>
      <select id={id} value={value} onChange={(event) => change(event.target.value)} className="min-h-10 w-full rounded border-2 border-ink-faint bg-paper-raised px-2 text-ink">
        {options.map(([key, words]) => <option key={key} value={key}>{words}</option>)}
      </select>
    </div>
  );
}
