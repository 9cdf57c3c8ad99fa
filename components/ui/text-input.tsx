'use client';
import { useId } from 'react';
import type { InputHTMLAttributes } from 'react';

type Props = InputHTMLAttributes<HTMLInputElement> & { readonly label: string };

/** A line to write on, with its label above. */
export function TextInput({ label, className = '', ...rest }: Props) {
  const id = useId();
  return (
    <div className={className}>
      <label htmlFor={id} className="mb-1 block font-bold">{label}</label>
      <input id={id} className="min-h-target w-full rounded-lg border-2 border-ink-faint bg-paper-raised px-3 text-xl text-ink" {...rest} />
    </div>
  );
}
