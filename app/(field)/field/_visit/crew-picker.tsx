'use client';
import { useId } from 'react';
import { Icon } from '@/components/ui/icon';
import type { PackSummary } from '@/lib/client/field-store-types';
import type { Crew } from '../_hooks/use-crew';

type Props = { readonly people: PackSummary['people']; readonly crew: Crew; readonly change: (crew: Crew) => void };

/** Who measures and calls, who records; one tap swaps them. */
export function CrewPicker({ people, crew, change }: Props) {
  return (
    <section aria-label="Crew" className="grid grid-cols-[1fr_auto_1fr] items-end gap-2">
      <PersonSelect label="Measures" people={people} value={crew.measurerId} change={(measurerId) => change({ ...crew, measurerId })} />
      <button
        type="button" aria-label="Swap who measures and who records" onClick={() => change({ measurerId: crew.recorderId, recorderId: crew.measurerId })}
        className="grid min-h-target min-w-target cursor-pointer place-items-center rounded-lg border-2 border-ink-faint bg-paper-raised active:bg-paper-sunk"
      >
        <Icon name="swap" />
      </button>
      <PersonSelect label="Records" people={people} value={crew.recorderId} change={(recorderId) => change({ ...crew, recorderId })} />
    </section>
  );
}

function PersonSelect({ label, people, value, change }: { label: string; people: PackSummary['people']; value: string | null; change: (id: string | null) => void }) {
  const id = useId();
  return (
    <div className="min-w-0">
      <label htmlFor={id} className="mb-1 block font-bold">{label}</label>
      <select
        id={id} value={value ?? ''} onChange={(event) => change(event.target.value || null)}
        className="min-h-target w-full min-w-0 truncate rounded-lg border-2 border-ink-faint bg-paper-raised px-2 text-lg text-ink"
      >
        <option value="">Nobody set</option>
        {people.map(({ id: personId, name }) => <option key={personId} value={personId}>{name}</option>)}
      </select>
    </div>
  );
}
