'use client';
import { useMemo, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Icon } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import type { Plot } from '@/lib/schema/design';
import type { Visit } from '@/lib/schema/field';
import { measurementsOf, openLooksOf, treeCount } from '../_data/plot-summary';
import type { ProjectRecords } from '../_data/project-records';
import type { ProjectView } from '../_data/project-view';
import { deleteStem, restoreStem } from '../_entry/delete-stem';
import { entryPorts } from '../_entry/entry-ports';
import { useCrew } from '../_hooks/use-crew';
import { useEntry } from '../_hooks/use-entry';
import { useScreen } from '../_hooks/use-screen';
import { useVisitSaver } from '../_hooks/use-visit-saver';
import { useWide } from '../_hooks/use-wide';
import { useField } from '../_shell/field-context';
import { EntryCard } from '../_visit/entry-card';
import { lastEntered } from '../_visit/last-entered';
import { ReadBack } from '../_visit/read-back';
import { summariseStem } from '../_visit/stem-summary';
import { TreeList } from '../_visit/tree-list';
import { VisitHead } from '../_visit/visit-head';

type Props = { readonly records: ProjectRecords; readonly view: ProjectView; readonly plot: Plot; readonly visit: Visit };

/** A visit under way: the entry card, the last entry for read-back, the list of trees. */
export function VisitScreen({ records, view, plot, visit }: Props) {
  const { identity, go } = useField();
  const wide = useWide();
  const [listed, setListed] = useState(false);
  const blind = visit.kind === 'blind';
  const { screen, learn } = useScreen(view, blind ? plot.id : null);
  const { saver, state: save, retry } = useVisitSaver(view, learn);
  const { people, setCrew } = useCrew(plot.projectId);
  const project = records.project.get(plot.projectId)!;
  const place = useMemo(() => ({ id: visit.id, projectId: visit.projectId, plotId: visit.plotId }), [visit.id, visit.projectId, visit.plotId]);
  const { measurerId, recorderId } = visit;
  const ports = useMemo(
    () => (screen ? entryPorts({ project, visit: { measurerId, recorderId }, species: records.speciesEntry, authorId: identity.userId, screen }) : null),
    [project, measurerId, recorderId, records.speciesEntry, identity.userId, screen],
  );
  const entry = useEntry(place, records, ports, saver);
  const stems = useMemo(() => measurementsOf(records, visit.id).map((measurement) => summariseStem(records, measurement)), [records, visit.id]);
  const deleted = useMemo(() => measurementsOf(records, visit.id, true).map((measurement) => summariseStem(records, measurement)), [records, visit.id]);
  const doubts = openLooksOf(records, visit.id).length;
  const trees = treeCount(records, visit.id);

  const changeCrew = (crew: { measurerId: string | null; recorderId: string | null }) => {
    setCrew(crew);
    saver.save([{ entity: 'visit', recordId: visit.id, kind: 'set', group: 'people', values: crew }]);
  };
  const finish = () => {
    entry?.settle();
    go({ name: 'finish', projectId: plot.projectId, plotId: plot.id, visitId: visit.id });
  };
  const list = entry && (
    <TreeList
      stems={stems} deleted={deleted} current={entry.state.saved.measurement ? entry.state.measurement.id : null}
      open={(id) => {
        entry.open(id);
        setListed(false);
      }}
      remove={(id) => entry.change(deleteStem(records, id), 'Deleted by the crew')}
      restore={(id) => entry.change(restoreStem(records, id), 'Brought back by the crew')}
    />
  );

  return (
    <div className="mx-auto flex min-h-dvh max-w-6xl flex-col">
      <VisitHead plot={plot} visit={visit} people={people} changeCrew={changeCrew} trees={trees} doubts={doubts} listed={listed} wide={wide} toggleList={() => setListed((before) => !before)} />
      <main className="flex flex-1 flex-col min-[900px]:grid min-[900px]:grid-cols-[minmax(380px,460px)_1fr]">
        {visit.state !== 'open' && visit.state !== 'sentBack' && <p className="p-4 text-lg">This visit is finished. Open it again from the plot’s page to change it.</p>}
        {entry && project && (visit.state === 'open' || visit.state === 'sentBack') && (wide || !listed) && (
          <div className="flex flex-1 flex-col">
            <ReadBack last={lastEntered(records, stems)} save={save} undo={entry.undo} />
            {save.kind === 'failed' && (
              <div className="p-2">
                <Notice tone="halt" icon="hazard" live="alert" title="Not saved">
                  <p>{save.waiting === 1 ? 'One entry is' : `${save.waiting} entries are`} only on this screen. Do not close it. {save.reason}</p>
                  <Button kind="halt" className="mt-2 w-full" onClick={retry}>Save again</Button>
                </Notice>
              </div>
            )}
            <div className="flex flex-1 flex-col justify-end min-[900px]:justify-start">
              <EntryCard entry={entry} records={records} project={project} screen={screen} visit={place} blind={blind} />
            </div>
          </div>
        )}
        {(wide || listed) && (
          <div className="border-paper-line min-[900px]:border-l-2">
            {list}
            <div className="p-3"><Button kind={listed ? 'main' : 'plain'} className="flex w-full items-center justify-center gap-2" onClick={finish}><Icon name="check" />Finish the visit</Button></div>
          </div>
        )}
      </main>
    </div>
  );
}
