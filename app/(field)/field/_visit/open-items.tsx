'use client';
import { Icon } from '@/components/ui/icon';
import type { Plot } from '@/lib/schema/design';
import type { Visit } from '@/lib/schema/field';
import { measurementsOf, openLooksOf } from '../_data/plot-summary';
import type { ProjectRecords } from '../_data/project-records';
import type { ProjectView } from '../_data/project-view';
import { beginAt } from '../_entry/begin-at';
import { doubtSentence } from '../_entry/doubt-words';
import { knownStems } from '../_entry/next-entry';
import { useField } from '../_shell/field-context';
import { missingWords, summariseStem } from './stem-summary';

type Props = { readonly records: ProjectRecords; readonly view: ProjectView; readonly plot: Plot; readonly visit: Visit };

/** What is open before the crew leaves: doubts in order of entry, then values missing, then trees not met again. */
export function OpenItems({ records, view, plot, visit }: Props) {
  const { go, store } = useField();
  const project = records.project.get(plot.projectId);
  const looks = openLooksOf(records, visit.id);
  const stems = measurementsOf(records, visit.id).map((measurement) => summariseStem(records, measurement));
  const gaps = stems.flatMap((stem) => (missingWords(stem).length > 0 ? [{ stem, missing: missingWords(stem) }] : []));
  const unmet = knownStems(records, plot.id, visit.id);
  const labels = new Map(stems.map((stem) => [stem.measurement.id, stem.label]));

  async function open(measurementId: string) {
    const draft = beginAt(view, visit, measurementId);
    if (draft) await store.saveDraft(draft);
    go({ name: 'visit', projectId: plot.projectId, plotId: plot.id, visitId: visit.id });
  }

  if (looks.length + gaps.length + unmet.length === 0) {
    return <p className="flex items-center gap-2 text-lg"><Icon name="check" className="size-6 text-fine" />No open doubts, nothing missing.</p>;
  }
  return (
    <section aria-label="Still open" className="space-y-4">
      {looks.length > 0 && (
        <div>
          <h2 className="text-xl font-bold">{looks.length} open {looks.length === 1 ? 'doubt' : 'doubts'}</h2>
          <ol>
            {looks.map((look) => (
              <li key={look.id} className="mt-2">
                <button type="button" onClick={() => void open(look.measurementId)} className="doubt-tag relative flex min-h-[60px] w-full cursor-pointer items-center gap-3 overflow-hidden rounded-lg py-2 pr-3 pl-5 text-left">
                  <span className="doubt-edge absolute inset-y-0 left-0 w-2.5" aria-hidden="true" />
                  <Icon name="doubt" />
                  <span><b>Tree {labels.get(look.measurementId)}</b>: {project && doubtSentence(look, project)}</span>
                </button>
              </li>
            ))}
          </ol>
        </div>
      )}
      {gaps.length > 0 && (
        <div>
          <h2 className="text-xl font-bold">Not complete</h2>
          <ul>
            {gaps.map(({ stem, missing }) => (
              <li key={stem.measurement.id} className="book-line">
                <button type="button" onClick={() => void open(stem.measurement.id)} className="min-h-target w-full cursor-pointer text-left active:bg-paper-sunk"><b>Tree {stem.label}</b>: no {missing.join(', no ')}</button>
              </li>
            ))}
          </ul>
        </div>
      )}
      {unmet.length > 0 && <p>Known from an earlier visit and not measured now: <span className="digits">{unmet.map(({ label }) => label).join(', ')}</span></p>}
      <p className="text-ink-soft">A visit can be finished with these open; they stay listed for the lead.</p>
    </section>
  );
}
