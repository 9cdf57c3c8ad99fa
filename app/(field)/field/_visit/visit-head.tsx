'use client';
import { Icon } from '@/components/ui/icon';
import type { PackSummary } from '@/lib/client/field-store-types';
import type { Plot } from '@/lib/schema/design';
import type { Visit } from '@/lib/schema/field';
import type { Crew } from '../_hooks/use-crew';
import { useField } from '../_shell/field-context';
import { ThemeToggle } from '../_shell/theme-toggle';

type Props = {
  readonly plot: Plot;
  readonly visit: Visit;
  readonly people: PackSummary['people'];
  readonly changeCrew: (crew: Crew) => void;
  readonly trees: number;
  readonly doubts: number;
  readonly listed: boolean;
  readonly wide: boolean;
  readonly toggleList: () => void;
};

/** Head of a visit: back to the plot, who measures and who records (one tap swaps them), the list. */
export function VisitHead({ plot, visit, people, changeCrew, trees, doubts, listed, wide, toggleList }: Props) {
  const { go } = useField();
  const nameOf = (id: string | null) => people.find((person) => person.id === id)?.name.split(' ')[0] ?? 'nobody';
  const { measurerId, recorderId } = visit;
  const count = `${trees} ${trees === 1 ? 'tree' : 'trees'}`;
  return (
    <header className="book-head sticky top-0 z-10 flex items-center bg-paper">
      <button type="button" aria-label="Back to the plot" onClick={() => go({ name: 'plot', projectId: plot.projectId, plotId: plot.id })} className="grid min-h-[60px] min-w-target cursor-pointer place-items-center">
        <Icon name="back" className="size-7" />
      </button>
      <h1 className="shrink-0 leading-tight font-bold"><span className="block text-xs font-normal text-ink-soft">Plot</span><span className="digits text-xl">{plot.number}</span></h1>
      <button
        type="button" onClick={() => changeCrew({ measurerId: recorderId, recorderId: measurerId })}
        className="mx-1 flex min-h-[60px] min-w-0 flex-1 cursor-pointer items-center justify-center gap-2 px-1 text-left text-sm leading-tight active:bg-paper-sunk"
      >
        <span className="min-w-0"><span className="block truncate"><b>{nameOf(measurerId)}</b> measures </span><span className="block truncate"><b>{nameOf(recorderId)}</b> records</span></span>
        <span className="sr-only">. Swap</span>
        <Icon name="swap" className="size-5" />
      </button>
      {wide && <ThemeToggle />}
      {!wide && (
        <button
          type="button" aria-pressed={listed} onClick={toggleList}
          className="flex min-h-[60px] min-w-[84px] cursor-pointer items-center justify-center gap-1.5 px-2 text-sm leading-tight font-bold active:bg-paper-sunk"
        >
          <Icon name={listed ? 'back' : 'list'} className="size-5" />
          <span className="text-left">{listed ? 'Entry' : <><span className="sr-only">List: </span>{count}</>} {doubts > 0 && <span className="block text-doubt">{doubts} {doubts === 1 ? 'doubt' : 'doubts'}</span>}</span>
        </button>
      )}
    </header>
  );
}
