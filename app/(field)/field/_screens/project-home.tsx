'use client';
import { useMemo, useState } from 'react';
import { Icon } from '@/components/ui/icon';
import { TextInput } from '@/components/ui/text-input';
import { summarisePlots } from '../_data/plot-summary';
import type { PlotSummary } from '../_data/plot-summary';
import type { ProjectRecords } from '../_data/project-records';
import { roundStart } from '../_data/round-start';
import { useField } from '../_shell/field-context';
import { QueueLine } from '../_shell/queue-line';
import { ThemeToggle } from '../_shell/theme-toggle';
import { TopBar } from '../_shell/top-bar';

type Props = { readonly records: ProjectRecords; readonly projectId: string };

/** The contents page of the book: plots by stratum, each with its state in words. */
export function ProjectScreen({ records, projectId }: Props) {
  const [search, setSearch] = useState('');
  const plots = useMemo(() => summarisePlots(records, roundStart()), [records]);
  const wanted = search.trim().toLowerCase();
  const shown = wanted === '' ? plots : plots.filter(({ plot }) => plot.number.toLowerCase().includes(wanted));
  const strata = [...records.stratum.values()].filter(({ deleted }) => !deleted);
  const left = plots.filter(({ state }) => state !== 'finished').length;
  const doubts = plots.reduce((sum, summary) => sum + summary.doubts, 0);
  return (
    <>
      <TopBar back={{ name: 'projects' }} backLabel="Projects" over={`${plots.length} plots, ${left} to go`} title={records.project.get(projectId)?.name ?? 'Project'}>
        <ThemeToggle />
      </TopBar>
      <main className="mx-auto max-w-4xl pb-10">
        <QueueLine projectId={projectId} />
        <div className="flex items-end gap-3 px-4 pt-3">
          <TextInput className="flex-1" label="Plot number" type="search" inputMode="search" value={search} onChange={(event) => setSearch(event.target.value)} />
          <p className="pb-3 text-right leading-tight">
            <span className="digits block text-2xl font-bold">{doubts}</span>
            <span className="text-sm">open {doubts === 1 ? 'doubt' : 'doubts'}</span>
          </p>
        </div>
        {shown.length === 0 && <p className="p-4 text-lg">No plot has this number.</p>}
        {strata.map(({ id, name }) => <StratumPlots key={id} name={name} plots={shown.filter(({ stratum }) => stratum?.id === id)} projectId={projectId} />)}
        <StratumPlots name="No stratum" plots={shown.filter(({ stratum }) => stratum === null)} projectId={projectId} />
      </main>
    </>
  );
}

function StratumPlots({ name, plots, projectId }: { readonly name: string; readonly plots: readonly PlotSummary[]; readonly projectId: string }) {
  if (plots.length === 0) return null;
  return (
    <section aria-label={name} className="mt-5">
      <h2 className="border-b-2 border-bronze px-4 pb-1 text-lg font-bold">{name}</h2>
      <ul className="md:grid md:grid-cols-2">
        {plots.map((summary) => <li key={summary.plot.id} className="book-line"><PlotLine summary={summary} projectId={projectId} /></li>)}
      </ul>
    </section>
  );
}

function PlotLine({ summary: { plot, state, words, doubts }, projectId }: { readonly summary: PlotSummary; readonly projectId: string }) {
  const { go } = useField();
  return (
    <button
      type="button" onClick={() => go({ name: 'plot', projectId, plotId: plot.id })}
      className="flex min-h-[60px] w-full cursor-pointer items-center gap-3 px-4 text-left active:bg-paper-sunk"
    >
      <span className="digits w-14 shrink-0 text-2xl font-bold"><span className="sr-only">Plot </span>{plot.number}</span>
      <span className={state === 'not-started' ? 'flex-1 text-ink-soft' : 'flex-1 font-bold'}>
        {state === 'finished' && <Icon name="check" className="mr-1 inline size-5 text-fine" />}{words}
      </span>
      {plot.hazardNote !== '' && <span className="flex items-center gap-1 text-sm text-halt"><Icon name="hazard" className="size-5" /><span className="max-[420px]:sr-only">hazard</span></span>}
      {doubts > 0 && <span className="doubt-tag flex items-center gap-1 rounded px-2 py-1 font-bold"><Icon name="doubt" className="size-5" />{doubts}<span className="sr-only"> open doubts</span></span>}
    </button>
  );
}
