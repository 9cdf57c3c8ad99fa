'use client';
import { Button } from '@/components/ui/button';
import { Icon } from '@/components/ui/icon';
import type { Screen } from '@/lib/checks/types';
import type { Project } from '@/lib/schema/project';
import type { Quantity } from '@/lib/schema/field';
import { decimalSign } from '../_data/decimal-sign';
import { readAsWords } from '../_entry/read-as';
import { openQuestion } from '../_entry/raise-looks';
import { knownStems, nextTag, stemLabel } from '../_entry/next-entry';
import { standingDigits } from '../_entry/transition';
import { quantityWords, unitOf } from '../_entry/doubt-words';
import type { ProjectRecords } from '../_data/project-records';
import { formWords, statusWords } from '../_data/words';
import type { Entry } from '../_hooks/use-entry';
import { EntryPanel } from './entry-panel';
import { SpeciesButtons } from './species-buttons';
import { ValueField } from './value-field';

export type EntryCardProps = {
  readonly entry: Entry;
  readonly records: ProjectRecords;
  readonly project: Project;
  readonly screen: Screen | null;
  readonly visit: { readonly id: string; readonly plotId: string };
  /** A blind visit sees neither band nor expectation. */
  readonly blind: boolean;
};

/** One stem: species, status and form, DBH, height, and below them the pad or the one question there is. */
export function EntryCard(props: EntryCardProps) {
  const { entry, records, project, visit } = props;
  const { state, send } = entry;
  const { measurement, typing, panel } = state;
  const species = [...records.speciesEntry.values()].filter(({ deleted }) => !deleted).sort((a, b) => a.position - b.position);
  const label = stemLabel(state.tree, state.stem);
  const question = openQuestion(state.looks);
  const known = knownStems(records, visit.plotId, visit.id).filter(({ stem }) => stem.id !== state.stem.id);

  const field = (quantity: Quantity) => {
    const unit = unitOf(quantity, project);
    const standing = standingDigits(measurement, quantity);
    const mine = typing?.quantity === quantity ? typing : null;
    const digits = mine ? mine.digits : standing ?? '';
    return (
      <ValueField
        key={quantity} label={quantityWords[quantity]} unit={unit} active={state.focus === quantity} digits={digits} typing={mine !== null}
        first={mine && mine.purpose !== 'first' && state.goesOn === null ? standing : null} unreadable={state.unreadable === quantity}
        readAs={readAsWords(digits, quantity, project)} doubt={openQuestion(state.looks, quantity) !== null}
        type={(text) => send({ kind: 'type', quantity, digits: text })} focus={() => send({ kind: 'focus', quantity })}
        leave={() => send({ kind: 'leave', quantity })} next={() => send({ kind: 'next' })}
      />
    );
  };

  return (
    <section data-entry-card aria-label={`Tree ${label}`} className="space-y-1.5 p-2">
      <div className="flex items-center gap-1.5">
        <button type="button" onClick={() => send({ kind: 'show', panel: { kind: panel.kind === 'tag' ? 'pad' : 'tag' } })} className="min-h-target min-w-[84px] cursor-pointer rounded-lg px-2 text-left active:bg-paper-sunk">
          <span className="block text-xs leading-tight text-ink-soft">Tree </span>
          <span className="digits block text-3xl leading-none font-bold text-bronze">{label}</span>
          <span className="sr-only">, choose another</span>
        </button>
        <Button size="small" className="min-w-0 flex-1 px-2" onClick={() => send({ kind: 'show', panel: { kind: panel.kind === 'form' ? 'pad' : 'form' } })}>
          <span className="sr-only">Status and form: </span>{statusWords[measurement.status]}, {formWords[measurement.form].toLowerCase()}
        </Button>
        <Button size="small" className="min-w-0 flex-1 px-2" disabled={!state.saved.tree} onClick={entry.anotherStem}>Another stem</Button>
      </div>
      {/* A question takes the room of the species on a phone; the values stay in sight. */}
      <div className={panel.kind === 'pad' ? '' : 'max-[899px]:hidden'}>
        <SpeciesButtons species={species} chosen={measurement.speciesId} choose={(speciesId) => send({ kind: 'species', speciesId })} />
      </div>
      <div className="grid grid-cols-2 gap-2">{field('dbh')}{field('height')}</div>
      {question && panel.kind === 'pad' && (
        <button type="button" onClick={() => send({ kind: 'show', panel: { kind: 'doubt', lookId: question.id } })} className="doubt-tag relative flex min-h-target w-full cursor-pointer items-center gap-2 overflow-hidden rounded-lg pr-3 pl-5 text-left font-bold">
          <span className="doubt-edge absolute inset-y-0 left-0 w-2.5" aria-hidden="true" />
          <Icon name="doubt" />Open doubt: {question.quantity === 'dbh' ? 'DBH' : 'height'}{question.enteredDigits && ` ${question.enteredDigits}`}
        </button>
      )}
      <EntryPanel {...props} sign={decimalSign()} known={known} newTag={nextTag(records, visit.plotId)} />
    </section>
  );
}
