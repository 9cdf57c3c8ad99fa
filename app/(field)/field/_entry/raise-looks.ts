import type { Doubt } from '@/lib/checks/types';
import type { Answer, Quantity, SecondLook } from '@/lib/schema/field';
import type { RecordChange } from '@/lib/schema/record-change';
import { stemEntry } from './stem-entry';
import type { EntryPorts, EntryState } from './types';

type Looked = { readonly looks: readonly SecondLook[]; readonly changes: readonly RecordChange[] };

/** Answers that keep the value as it is: the same digits are not asked about again. */
const settled: ReadonlySet<Answer> = new Set<Answer>(['accepted', 'measured-again', 'settled-in-office']);

function answerChange(look: SecondLook): RecordChange {
  const { answer, reason, answerNote, answeredById, answeredAt, answerReadingId } = look;
  return {
    entity: 'secondLook', recordId: look.id, kind: 'set', group: 'answer',
    values: { answer, reason, answerNote, answeredById, answeredAt, answerReadingId },
  };
}

function answerOne(looks: readonly SecondLook[], lookId: string, answer: Partial<SecondLook> & { answer: Answer }, ports: EntryPorts): Looked {
  const former = looks.find(({ id }) => id === lookId);
  if (!former || former.answer !== 'open') return { looks, changes: [] };
  const look: SecondLook = { ...former, answeredById: ports.authorId, answeredAt: ports.now(), ...answer };
  return { looks: looks.map((other) => (other.id === lookId ? look : other)), changes: [answerChange(look)] };
}

/**
 * The looks with one of them answered, and the changes that save it. Whoever looked at a value again has answered
 * every doubt about that value, so those about the same digits go with it.
 */
export function answerLook(looks: readonly SecondLook[], lookId: string, answer: Partial<SecondLook> & { answer: Answer }, ports: EntryPorts): Looked {
  const asked = looks.find(({ id }) => id === lookId);
  if (!asked) return { looks, changes: [] };
  const same = looks.filter((look) => look.id === lookId
    || (look.answer === 'open' && look.level === 'look' && !look.deleted && look.quantity === asked.quantity && look.enteredDigits === asked.enteredDigits));
  return same.reduce<Looked>((sofar, { id }) => {
    const one = answerOne(sofar.looks, id, answer, ports);
    return { looks: one.looks, changes: [...sofar.changes, ...one.changes] };
  }, { looks, changes: [] });
}

function makeLook(state: EntryState, doubt: Doubt, ports: EntryPorts): SecondLook {
  const { measurement } = state;
  const readingIds = doubt.quantity === 'dbh' ? measurement.dbhReadingIds : measurement.heightReadingIds;
  return {
    id: ports.newId(), projectId: measurement.projectId, deleted: false, visitId: measurement.visitId, measurementId: measurement.id,
    readingId: readingIds.at(-1) ?? null, rule: doubt.rule, moment: doubt.moment, level: doubt.level, quantity: doubt.quantity,
    enteredDigits: doubt.enteredDigits, enteredCanonical: doubt.enteredCanonical, expectedLow: doubt.expectedLow, expectedHigh: doubt.expectedHigh,
    tailProbability: doubt.tailProbability, cause: doubt.cause, causeProbability: doubt.causeProbability,
    suggestedQuantity: doubt.suggestion?.quantity ?? null, suggestedDigits: doubt.suggestion?.digits ?? null,
    raisedBy: 'device', raisedAt: ports.now(), answer: 'open', reason: null, answerNote: '', answeredById: null, answeredAt: null, answerReadingId: null,
  };
}

const sameValue = (look: SecondLook, doubt: Doubt) => look.quantity === doubt.quantity && look.enteredDigits === doubt.enteredDigits;
/** A question stays one, even when something more telling has come up since; a mark can become a question. */
const covers = (look: SecondLook, doubt: Doubt) => sameValue(look, doubt) && look.rule === doubt.rule && look.cause === doubt.cause
  && look.suggestedDigits === (doubt.suggestion?.digits ?? null) && (look.level === 'look' || doubt.level === 'quiet');

/**
 * Compares the doubts about a stem as it stands with the looks it has: doubts that no longer hold are withdrawn (with the
 * reading that made them moot, where there is one), new ones are raised, answered ones stay answered.
 */
export function raiseLooks(state: EntryState, moot: { readonly readingId: string | null }, ports: EntryPorts): Looked {
  const { measurement, tree } = state;
  const doubts = ports.check(stemEntry(measurement, tree.plotId, ports.curveGroup(measurement.speciesId)));
  let looks = state.looks;
  const changes: RecordChange[] = [];
  for (const look of state.looks) {
    if (look.answer !== 'open' || look.deleted || look.raisedBy !== 'device') continue;
    if (doubts.some((doubt) => covers(look, doubt))) continue;
    const withdrawn = answerOne(looks, look.id, { answer: 'withdrawn', answerReadingId: moot.readingId }, ports);
    looks = withdrawn.looks;
    changes.push(...withdrawn.changes);
  }
  for (const doubt of doubts) {
    const known = looks.some((look) => !look.deleted
      && ((settled.has(look.answer) && look.level === 'look' && sameValue(look, doubt)) || (look.answer === 'open' && covers(look, doubt))));
    if (known) continue;
    const look = makeLook(state, doubt, ports);
    looks = [...looks, look];
    changes.push({ entity: 'secondLook', recordId: look.id, kind: 'create', values: look });
  }
  return { looks, changes };
}

/** The question to ask next about a stem: the oldest open look that wants an answer. */
export function openQuestion(looks: readonly SecondLook[], quantity?: Quantity): SecondLook | null {
  return looks.find((look) => look.answer === 'open' && look.level === 'look' && !look.deleted && (quantity === undefined || look.quantity === quantity)) ?? null;
}
