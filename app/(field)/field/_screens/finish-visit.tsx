'use client';
import { useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { classNames } from '@/components/ui/class-names';
import { Icon } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import { visitOutcomeSchema } from '@/lib/schema/field';
import type { Visit, VisitOutcome } from '@/lib/schema/field';
import type { Plot } from '@/lib/schema/design';
import { openLooksOf, treeCount } from '../_data/plot-summary';
import type { ProjectRecords } from '../_data/project-records';
import type { ProjectView } from '../_data/project-view';
import { outcomeHints, outcomeWords } from '../_data/words';
import { entryDraftId } from '../_entry/entry-draft';
import { useField } from '../_shell/field-context';
import { TopBar } from '../_shell/top-bar';
import { OpenItems } from '../_visit/open-items';

type Props = { readonly records: ProjectRecords; readonly view: ProjectView; readonly plot: Plot; readonly visit: Visit };

/** Leaving the plot: what is still open comes first, then how the visit ended. Zero trees is a result, not a gap. */
export function FinishScreen({ records, view, plot, visit }: Props) {
  const { identity, go } = useField();
  const [outcome, setOutcome] = useState<VisitOutcome | null>(visit.outcome);
  const [note, setNote] = useState(visit.outcomeNote);
  const [fault, setFault] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const noteId = useId();
  const doubts = openLooksOf(records, visit.id).length;
  const trees = treeCount(records, visit.id);
  const clash = outcome === 'no-trees' && trees > 0;
  const wantsNote = outcome === 'part' && note.trim() === '';

  async function finish() {
    if (!outcome) return;
    setBusy(true);
    try {
      await view.commit([{
        entity: 'visit', recordId: visit.id, kind: 'set', group: 'ending',
        values: { state: 'finished', outcome, outcomeNote: note.trim(), finishedAt: new Date().toISOString() },
      }], identity.userId, { draft: { remove: entryDraftId(visit.id) } });
      go({ name: 'project', projectId: plot.projectId });
    } catch (error) {
      setFault(error instanceof Error ? error.message : String(error));
      setBusy(false);
    }
  }

  return (
    <>
      <TopBar back={{ name: 'visit', projectId: plot.projectId, plotId: plot.id, visitId: visit.id }} backLabel="Back to the visit" over={`Plot ${plot.number}`} title="Finish the visit" />
      <main className="mx-auto max-w-2xl space-y-5 p-4 pb-10">
        <OpenItems records={records} view={view} plot={plot} visit={visit} />
        <fieldset>
          <legend className="mb-2 text-xl font-bold">How did it end?</legend>
          <div className="grid gap-2 min-[600px]:grid-cols-2">
            {visitOutcomeSchema.options.map((option) => (
              <label key={option} className={classNames('flex min-h-[64px] cursor-pointer items-center gap-3 rounded-lg border-2 px-3 py-1.5', option === outcome ? 'border-bronze-strong bg-bronze-wash' : 'border-ink-faint bg-paper-raised')}>
                <input type="radio" name="outcome" value={option} checked={option === outcome} onChange={() => setOutcome(option)} className="size-6 accent-current" />
                <span className="leading-tight"><span className="block text-lg font-bold">{outcomeWords[option]}</span><span className="text-sm text-ink-soft">{outcomeHints[option]}</span></span>
              </label>
            ))}
          </div>
        </fieldset>
        <div>
          <label htmlFor={noteId} className="mb-1 block font-bold">Note{outcome === 'part' && ' (which part was measured)'}</label>
          <textarea id={noteId} rows={3} value={note} maxLength={5000} onChange={(event) => setNote(event.target.value)} className="w-full rounded-lg border-2 border-ink-faint bg-paper-raised p-3 text-lg text-ink" />
        </div>
        {clash && <Notice icon="hazard" live="alert"><p>{trees} {trees === 1 ? 'tree is' : 'trees are'} recorded. Delete {trees === 1 ? 'it' : 'them'} first, or choose another outcome.</p></Notice>}
        {wantsNote && <p>Say in the note which part was measured.</p>}
        {fault && <Notice tone="halt" icon="hazard" live="alert" title="Not saved"><p>{fault}</p></Notice>}
        <Button size="large" kind="main" className="flex w-full items-center justify-center gap-2" disabled={!outcome || clash || wantsNote || busy} onClick={() => void finish()}>
          <Icon name="check" />{doubts > 0 ? `Finish with ${doubts} open ${doubts === 1 ? 'doubt' : 'doubts'}` : 'Finish the visit'}
        </Button>
      </main>
    </>
  );
}
