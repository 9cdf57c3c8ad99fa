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
      className={classNames('relative flex min-h-[64px] min-w-0 flex-1 cursor-pointer items-center gap-x-3 py-1.5 pr-1 pl-4 text-left active:bg-paper-sunk', current && 'bg-paper-sunk outline-2 -outline-offset-2 outline-bronze')}
    >
      {openDoubts > 0 && <span className="doubt-edge absolute inset-y-0 left-0 w-2.5" aria-hidden="true" />}
      <span className="digits w-12 shrink-0 text-xl font-bold"><span className="sr-only">Tree </span>{label}</span>
      <span className="min-w-0 flex-1 leading-tight min-[600px]:flex min-[600px]:items-center min-[600px]:gap-4">
        <span className="block truncate min-[600px]:flex-1"><b>{species?.localName ?? 'No species'}</b>{state && <span className="text-ink-soft">, {state}</span>}</span>
        <span className="digits block truncate text-lg">{dbh ?? 'no DBH'} · {height ?? 'no height'}</span>
        {openDoubts > 0 && <span className="flex items-center gap-1 text-sm font-bold text-doubt"><Icon name="doubt" className="size-4" />{openDoubts === 1 ? 'open doubt' : `${openDoubts} open doubts`}</span>}
      </span>
      {openDoubts === 0 && quiet > 0 && <span className="text-sm leading-tight text-ink-soft">marked</span>}
    </button>
  );
}
