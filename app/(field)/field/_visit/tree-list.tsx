'use client';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { classNames } from '@/components/ui/class-names';
import { Icon } from '@/components/ui/icon';
import type { StemSummary } from './stem-summary';

type Props = {
  readonly stems: readonly StemSummary[];
  readonly deleted: readonly StemSummary[];
  readonly current: string | null;
  readonly open: (measurementId: string) => void;
  readonly remove: (measurementId: string) => void;
  readonly restore: (measurementId: string) => void;
};

/** The page of the book with all trees so far, the last on top; each can be opened, deleted and brought back. */
export function TreeList({ stems, deleted, current, open, remove, restore }: Props) {
  const [asking, setAsking] = useState<string | null>(null);
  return (
    <section aria-label="Trees recorded" className="bg-paper-raised">
      {stems.length === 0 && <p className="p-4 text-lg text-ink-soft">No tree yet.</p>}
      <ol reversed>
        {stems.toReversed().map((stem) => (
          <li key={stem.measurement.id} className="book-line">
            <div className="flex items-stretch">
              <StemLine stem={stem} current={stem.measurement.id === current} open={open} />
              <button
                type="button" aria-label={`Delete tree ${stem.label}`} onClick={() => setAsking(stem.measurement.id)}
                className="grid min-w-target cursor-pointer place-items-center text-ink-soft active:bg-halt-wash"
              >
                <Icon name="bin" />
              </button>
            </div>
            {asking === stem.measurement.id && (
              <div role="alertdialog" aria-label={`Delete tree ${stem.label}?`} className="space-y-2 border-t-2 border-halt bg-halt-wash p-3">
                <p><b>Delete tree {stem.label}?</b> It goes out of the tally with its readings; it stays in the log and can be brought back below.</p>
                <div className="grid grid-cols-2 gap-2">
                  <Button onClick={() => setAsking(null)}>Keep it</Button>
                  <Button kind="halt" onClick={() => {
                    remove(stem.measurement.id);
                    setAsking(null);
                  }}
                  >Delete tree {stem.label} now</Button>
                </div>
              </div>
            )}
          </li>
        ))}
      </ol>
      {deleted.length > 0 && (
        <section aria-label="Deleted trees" className="border-t-2 border-bronze p-3">
          <h3 className="font-bold">Deleted</h3>
          <ul>
            {deleted.map((stem) => (
              <li key={stem.measurement.id} className="flex items-center gap-2">
                <span className="digits flex-1 line-through">{stem.label} · {stem.species?.localName ?? 'no species'} · {stem.dbh ?? 'no DBH'}</span>
                <Button kind="quiet" aria-label={`Restore tree ${stem.label}`} onClick={() => restore(stem.measurement.id)}>Restore</Button>
              </li>
            ))}
          </ul>
        </section>
      )}
    </section>
  );
}

function StemLine({ stem, current, open }: { readonly stem: StemSummary; readonly current: boolean; readonly open: (id: string) => void }) {
  const { label, species, dbh, height, state, openDoubts, quiet, measurement } = stem;
  return (
    <button
      type="button" aria-current={current || undefined} onClick={() => open(measurement.id)}
      className={classNames('relative grid min-h-[60px] min-w-0 flex-1 cursor-pointer grid-cols-[3rem_1fr_auto_auto] items-center gap-x-3 py-1 pr-1 pl-4 text-left active:bg-paper-sunk', current && 'bg-bronze-wash')}
    >
      {openDoubts > 0 && <span className="doubt-edge absolute inset-y-0 left-0 w-2.5" aria-hidden="true" />}
      <span className="digits text-xl font-bold"><span className="sr-only">Tree </span>{label}</span>
      <span className="min-w-0">
        <span className="block truncate font-bold">{species?.localName ?? 'No species'}</span>
        {state && <span className="block truncate text-sm text-ink-soft">{state}</span>}
        {openDoubts > 0 && <span className="flex items-center gap-1 text-sm font-bold text-doubt"><Icon name="doubt" className="size-4" />{openDoubts === 1 ? 'open doubt' : `${openDoubts} open doubts`}</span>}
        {openDoubts === 0 && quiet > 0 && <span className="block text-sm text-ink-soft">· marked, nothing to do</span>}
      </span>
      <span className="digits text-right text-lg">{dbh ?? '– DBH'}</span>
      <span className="digits text-right text-lg">{height ?? '– height'}</span>
    </button>
  );
}
