'use client';
import { classNames } from '@/components/ui/class-names';
import type { SpeciesEntry } from '@/lib/schema/design';

type Props = { readonly species: readonly SpeciesEntry[]; readonly chosen: string | null; readonly choose: (id: string) => void };

const capital = (name: string) => name.charAt(0).toUpperCase() + name.slice(1);

/** Species, each always in its place, so that a thumb finds it without looking. */
export function SpeciesButtons({ species, chosen, choose }: Props) {
  return (
    <div role="group" aria-label="Species" className="grid max-h-[124px] grid-cols-[repeat(auto-fill,minmax(100px,1fr))] gap-1.5 overflow-y-auto">
      {species.map(({ id, localName }) => (
        <button
          key={id} type="button" aria-pressed={id === chosen} aria-label={capital(localName)} onClick={() => choose(id)}
          className={classNames(
            'min-h-target min-w-0 cursor-pointer rounded-lg border-2 px-1 text-center leading-tight',
            id === chosen ? 'border-bronze-strong bg-bronze text-bronze-on' : 'border-ink-faint bg-paper-raised text-ink active:bg-bronze-wash',
          )}
        >
          <span className="line-clamp-2 font-bold [overflow-wrap:anywhere]">{capital(localName)}</span>
        </button>
      ))}
    </div>
  );
}
