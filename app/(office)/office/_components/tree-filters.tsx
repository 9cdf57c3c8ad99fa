'use client';
import { visitKindWords } from '@/lib/schema/words';
import type { ProjectOverview } from '@/lib/server/projects/project-overview';
import { Select } from './select';

type Props = {
  readonly filter: URLSearchParams;
  readonly overview: ProjectOverview | undefined;
  readonly change: (name: string, value: string) => void;
};

/** What narrows the tree table; every choice stands in the address, so a view can be sent to somebody. */
export function TreeFilters({ filter, overview, change }: Props) {
  const value = (name: string) => filter.get(name) ?? '';
  return (
    <form role="search" aria-label="Filter trees" className="grid grid-cols-2 gap-3 pb-4 sm:grid-cols-3 lg:grid-cols-5" onSubmit={(event) => event.preventDefault()}>
      <Select label="Doubts" value={value('doubts')} change={(next) => change('doubts', next)} options={[['', 'All trees'], ['any', 'With a second look'], ['open', 'With an open one']]} />
      <Select label="Stratum" value={value('stratum')} change={(next) => change('stratum', next)} options={[['', 'All strata'], ...(overview?.strata ?? []).map(({ id, name }) => [id, name] as const)]} />
      <Select label="Species" value={value('species')} change={(next) => change('species', next)} options={[['', 'All species'], ...(overview?.species ?? []).map(({ id, localName }) => [id, localName] as const)]} />
      <Select label="Visits" value={value('kind')} change={(next) => change('kind', next)} options={[['', 'All visits'], ...Object.entries(visitKindWords)]} />
      <div>
        <label htmlFor="filter-plot" className="block text-sm font-bold">Plot</label>
        <input id="filter-plot" defaultValue={value('plot')} onBlur={(event) => change('plot', event.target.value.trim())} onKeyDown={(event) => { if (event.key === 'Enter') change('plot', event.currentTarget.value.trim()); }} className="min-h-10 w-full rounded border-2 border-ink-faint bg-paper-raised px-2 text-ink" />
      </div>
    </form>
  );
}
