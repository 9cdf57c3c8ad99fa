'use client';
import { Icon } from '@/components/ui/icon';
import type { SaveState } from '../_hooks/use-visit-saver';
import type { StemSummary } from './stem-summary';

type Props = { readonly last: StemSummary | null; readonly save: SaveState; readonly undo: (() => void) | null };

/** The last entry, large, to be read back aloud; beside it whether it is saved, and undo. */
export function ReadBack({ last, save, undo }: Props) {
  return (
    <section aria-label="Last entry" className="flex min-h-target items-center gap-1 border-y border-paper-line bg-paper-sunk pr-1 pl-3">
      <div className="min-w-0 flex-1">
        {last
          ? (
            <p className="digits truncate text-xl leading-tight font-bold">
              <span className="text-bronze">{last.label}</span> {last.dbh ?? '–'} · {last.height ?? '–'}
            </p>
          )
          : <p className="text-lg leading-tight text-ink-soft">Nothing entered yet</p>}
        <p className="flex items-center gap-1 truncate text-sm leading-tight">
          {last && <span className="truncate">{last.species?.localName ?? 'No species'}</span>}
          <span role="status" className="flex items-center gap-1 font-bold">
            {save.kind === 'saved' && <><Icon name="check" className="size-4 text-fine" />Saved</>}
            {save.kind === 'saving' && 'Saving…'}
          </span>
        </p>
      </div>
      <button
        type="button" disabled={undo === null} onClick={() => undo?.()}
        className="grid min-h-target min-w-target cursor-pointer place-items-center content-center rounded-lg text-xs font-bold active:bg-bronze-wash disabled:cursor-default disabled:opacity-50"
      >
        <Icon name="undo" />Undo
      </button>
    </section>
  );
}
