'use client';
import { useState } from 'react';
import { v7 } from 'uuid';
import { Button } from '@/components/ui/button';
import { Icon } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import type { Plot } from '@/lib/schema/design';
import type { Visit } from '@/lib/schema/field';
import { summarisePlot, visitsByPlot } from '../_data/plot-summary';
import type { ProjectRecords } from '../_data/project-records';
import type { ProjectView } from '../_data/project-view';
import { roundStart } from '../_data/round-start';
import { dayWords } from '../_data/time-words';
import { outcomeWords } from '../_data/words';
import { useCrew } from '../_hooks/use-crew';
import { useField } from '../_shell/field-context';
import { TopBar } from '../_shell/top-bar';
import { CrewPicker } from '../_visit/crew-picker';

type Props = { readonly records: ProjectRecords; readonly view: ProjectView; readonly plot: Plot };

/** A plot before work: what can hurt, how to get there, who works, then the visit. */
export function PlotScreen({ records, view, plot }: Props) {
  const { go, identity } = useField();
  const { crew, setCrew, people } = useCrew(plot.projectId);
  const [fault, setFault] = useState<string | null>(null);
  const summary = summarisePlot(records, plot, visitsByPlot(records).get(plot.id) ?? [], roundStart());
  const project = records.project.get(plot.projectId);
  const earlier = (visitsByPlot(records).get(plot.id) ?? []).filter(({ id, state }) => id !== summary.open?.id && state !== 'open');
  const toVisit = (visitId: string) => go({ name: 'visit', projectId: plot.projectId, plotId: plot.id, visitId });

  async function start() {
    const visit: Visit = {
      id: v7(), projectId: plot.projectId, deleted: false, plotId: plot.id, kind: 'production', startedAt: new Date().toISOString(),
      measurerId: crew.measurerId, recorderId: crew.recorderId, state: 'open', outcome: null, outcomeNote: '', finishedAt: null,
    };
    try {
      await view.commit([{ entity: 'visit', recordId: visit.id, kind: 'create', values: visit }], identity.userId);
      toVisit(visit.id);
    } catch (error) {
      setFault(error instanceof Error ? error.message : String(error));
    }
  }

  return (
    <>
      <TopBar back={{ name: 'project', projectId: plot.projectId }} backLabel="Plots" over={summary.stratum?.name ?? ''} title={`Plot ${plot.number}`} />
      <main className="mx-auto max-w-2xl space-y-4 p-4">
        {plot.hazardNote !== '' && <Notice tone="halt" icon="hazard" title="Hazard"><p className="text-lg">{plot.hazardNote}</p></Notice>}
        {project && project.emergencyNote !== '' && (
          <Notice icon="phone" title="In an emergency"><p>{project.emergencyNote}</p></Notice>
        )}
        {plot.wayIn !== '' && <Notice icon="way" title="Way in"><p className="text-lg">{plot.wayIn}</p></Notice>}
        <section aria-label="Earlier visits">
          {earlier.length === 0
            ? <p className="text-ink-soft">No earlier visit.</p>
            : earlier.map((visit) => (
              <p key={visit.id} className="book-line py-2">
                Visited {dayWords(visit.startedAt)}: <b>{visit.outcome ? outcomeWords[visit.outcome].toLowerCase() : 'no outcome'}</b>
              </p>
            ))}
        </section>
        {!summary.open && <CrewPicker people={people} crew={crew} change={setCrew} />}
        {fault && <Notice tone="halt" icon="hazard" live="alert" title="Not saved"><p>{fault}</p></Notice>}
        {summary.state === 'finished' && summary.last && <FinishedVisit visit={summary.last} view={view} open={toVisit} />}
      </main>
      <div className="sticky bottom-0 mx-auto max-w-2xl border-t border-paper-line bg-paper p-3">
        {summary.open
          ? (
            <Button size="large" kind="main" className="flex w-full items-center justify-center gap-2" onClick={() => toVisit(summary.open!.id)}>
              Continue the visit<span className="font-normal">({summary.trees} {summary.trees === 1 ? 'tree' : 'trees'})</span>
            </Button>
          )
          : <Button size="large" kind={summary.state === 'finished' ? 'plain' : 'main'} className="w-full" onClick={() => void start()}>Start a visit</Button>}
      </div>
    </>
  );
}

/** A finished visit can be opened again by its crew while nobody signed it off. */
function FinishedVisit({ visit, view, open }: { readonly visit: Visit; readonly view: ProjectView; readonly open: (visitId: string) => void }) {
  const { identity } = useField();
  async function reopen() {
    await view.commit([{
      entity: 'visit', recordId: visit.id, kind: 'set', group: 'ending',
      values: { state: 'open', outcome: visit.outcome, outcomeNote: visit.outcomeNote, finishedAt: null },
    }], identity.userId, { reason: 'Opened again by the crew' });
    open(visit.id);
  }
  if (visit.state !== 'finished') return <p className="text-ink-soft">Signed off {visit.finishedAt ? dayWords(visit.finishedAt) : ''}; changes go through the lead.</p>;
  return (
    <div className="leaf-card space-y-2 rounded-lg bg-paper-raised p-4">
      <p className="flex items-center gap-2"><Icon name="check" className="size-6 text-fine" />Finished {visit.finishedAt ? dayWords(visit.finishedAt) : ''}, not signed off yet.</p>
      <Button className="w-full" onClick={() => void reopen()}>Open the finished visit again</Button>
    </div>
  );
}
