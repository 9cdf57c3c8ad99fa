import type { Quantity, Reading, SecondLook, StemMeasurement } from '@/lib/schema/field';
import type { RecordChange } from '@/lib/schema/record-change';
import { answerLook, openQuestion, raiseLooks } from './raise-looks';
import type { EntryEvent, EntryPorts, EntryState, EntryStep, Typing } from './types';

type Answering = { readonly lookId: string; readonly answer: 'measured-again' | 'read-again' | 'converted' };

const PAD = { kind: 'pad' } as const;
const MOST_DIGITS = 8;
const stay = (state: EntryState): EntryStep => ({ state, changes: [], done: false });

/** The digits that stand in a field; null when it is empty. */
export const standingDigits = (measurement: StemMeasurement, quantity: Quantity) => (quantity === 'dbh' ? measurement.dbhDigits : measurement.heightDigits);
const standingValue = (measurement: StemMeasurement, quantity: Quantity) => (quantity === 'dbh' ? measurement.dbhCm : measurement.heightM);

/** Records that the store does not hold yet: made together with the first value. */
function creations(state: EntryState): RecordChange[] {
  const { tree, stem, saved } = state;
  return [
    ...(saved.tree ? [] : [{ entity: 'tree', recordId: tree.id, kind: 'create', values: tree } as const]),
    ...(saved.stem ? [] : [{ entity: 'stem', recordId: stem.id, kind: 'create', values: stem } as const]),
  ];
}

/** Saves the working copy's group (or, the first time, the whole stem) and what `after` adds. */
function save(state: EntryState, group: string, values: Partial<StemMeasurement>, after: readonly RecordChange[]): EntryStep {
  const { measurement, saved } = state;
  const own: RecordChange = saved.measurement
    ? { entity: 'stemMeasurement', recordId: measurement.id, kind: 'set', group, values }
    : { entity: 'stemMeasurement', recordId: measurement.id, kind: 'create', values: measurement };
  return { state: { ...state, saved: { tree: true, stem: true, measurement: true } }, changes: [...creations(state), own, ...after], done: false };
}

function afterAnswer(state: EntryState): EntryState {
  const question = openQuestion(state.looks);
  return { ...state, panel: question ? { kind: 'doubt', lookId: question.id } : PAD };
}

/** Puts a reading in place: the value, what it answers, and the doubts about the stem as it now stands. */
function stand(state: EntryState, quantity: Quantity, digits: string, origin: Reading['origin'], answering: Answering | null, ports: EntryPorts): EntryStep {
  const value = ports.parse(digits);
  if (value === null) return stay({ ...state, unreadable: quantity });
  const { measurement } = state;
  const canonical = ports.canonical(quantity, value);
  const unit = quantity === 'dbh' ? ports.dbhUnit : ports.lengthUnit;
  const reading: Reading = {
    id: ports.newId(), projectId: measurement.projectId, deleted: false, measurementId: measurement.id, quantity, digits, unit, canonical, origin,
    instrument: null, measurerId: ports.measurerId, recorderId: ports.recorderId, takenAt: ports.now(),
  };
  // The protocol's rule here is the last reading; all readings stay as records of their own.
  const values: Partial<StemMeasurement> = quantity === 'dbh'
    ? { dbhDigits: digits, dbhUnit: ports.dbhUnit, dbhCm: canonical, dbhReadingIds: [reading.id] }
    : { heightDigits: digits, heightUnit: ports.lengthUnit, heightM: canonical, heightReadingIds: [reading.id], heightMethod: 'measured' };
  const standing: EntryState = {
    ...state, measurement: { ...measurement, ...values }, readings: [...state.readings, reading], typing: null, unreadable: null,
  };
  const answered = answering
    ? answerLook(standing.looks, answering.lookId, { answer: answering.answer, answerReadingId: reading.id }, ports)
    : { looks: standing.looks, changes: [] };
  const raised = raiseLooks({ ...standing, looks: answered.looks }, { readingId: reading.id }, ports);
  const made: RecordChange = { entity: 'reading', recordId: reading.id, kind: 'create', values: reading };
  return save({ ...standing, looks: raised.looks }, quantity, values, [made, ...answered.changes, ...raised.changes]);
}

/** What is typed in the field comes to stand; a changed answer to "Read again" asks first where the change comes from. */
function settleTyping(state: EntryState, ports: EntryPorts): EntryStep {
  const { typing, measurement } = state;
  if (!typing) return stay(state);
  if (typing.digits === '') return stay({ ...state, typing: null, unreadable: null });
  const value = ports.parse(typing.digits);
  if (value === null) return stay({ ...state, unreadable: typing.quantity });
  const same = standingValue(measurement, typing.quantity) === ports.canonical(typing.quantity, value);
  switch (typing.purpose) {
    case 'first':
      return stand(state, typing.quantity, typing.digits, 'first', null, ports);
    case 'edit':
      return typing.digits === standingDigits(measurement, typing.quantity)
        ? stay({ ...state, typing: null, unreadable: null })
        : stand(state, typing.quantity, typing.digits, 'retyped', null, ports);
    case 'again':
      if (!same) return stay({ ...state, panel: { kind: 'origin' }, unreadable: null });
      return stand(state, typing.quantity, typing.digits, 'again', typing.lookId === null ? null : { lookId: typing.lookId, answer: 'measured-again' }, ports);
  }
}

function chooseOrigin(state: EntryState, origin: 'again' | 'retyped', ports: EntryPorts): EntryStep {
  const { typing } = state;
  if (!typing) return stay({ ...state, panel: PAD });
  const answering: Answering | null = typing.lookId === null ? null
    : { lookId: typing.lookId, answer: origin === 'again' ? 'measured-again' : 'read-again' };
  const step = stand({ ...state, panel: PAD }, typing.quantity, typing.digits, origin, answering, ports);
  return { ...step, state: afterAnswer(step.state) };
}

/** Typing in a field that already holds a value about which there is a doubt answers that doubt; otherwise it edits. */
function beginTyping(state: EntryState, quantity: Quantity): Typing {
  if (state.typing?.quantity === quantity) return state.typing;
  const standing = standingDigits(state.measurement, quantity);
  if (standing !== null && state.goesOn === quantity) return { quantity, digits: standing, purpose: 'edit', lookId: null };
  if (standing === null) return { quantity, digits: '', purpose: 'first', lookId: null };
  const look = openQuestion(state.looks, quantity);
  return look ? { quantity, digits: '', purpose: 'again', lookId: look.id } : { quantity, digits: '', purpose: 'edit', lookId: null };
}

/** Keeps what can be part of a number: figures and one decimal sign. */
export function cleanDigits(text: string): string {
  const kept = text.replace(/[^0-9.,]/g, '');
  const sign = kept.search(/[.,]/);
  const once = sign < 0 ? kept : kept.slice(0, sign + 1) + kept.slice(sign + 1).replace(/[.,]/g, '');
  return once.slice(0, MOST_DIGITS);
}

function type(state: EntryState, quantity: Quantity, digits: string): EntryStep {
  return stay({ ...state, focus: quantity, panel: PAD, unreadable: null, typing: { ...beginTyping(state, quantity), digits: cleanDigits(digits) } });
}

/** The question to show after a step: one that it raised, or the one that a second reading was to answer and did not. */
function newQuestion(before: EntryState, after: EntryState): SecondLook | null {
  const question = openQuestion(after.looks);
  if (question && before.typing?.purpose === 'again' && after.typing === null) return question;
  return question && !before.looks.some(({ id, answer }) => id === question.id && answer === 'open') ? question : null;
}

function next(state: EntryState, ports: EntryPorts): EntryStep {
  if (state.panel.kind === 'origin') return stay(state);
  const settled = settleTyping(state, ports);
  if (settled.state.unreadable || settled.state.panel.kind === 'origin') return settled;
  const question = newQuestion(state, settled.state);
  if (question) return { ...settled, state: { ...settled.state, panel: { kind: 'doubt', lookId: question.id } } };
  if (state.focus === 'dbh' && settled.state.measurement.heightDigits === null) return { ...settled, state: { ...settled.state, focus: 'height', panel: PAD } };
  return { ...settled, done: true };
}

function resave(state: EntryState, group: 'species' | 'stem', values: Partial<StemMeasurement>, ports: EntryPorts): EntryStep {
  const changed: EntryState = { ...state, measurement: { ...state.measurement, ...values } };
  // Before the first value nothing is made: a species touched by mistake leaves no tree behind. The draft keeps it.
  if (!state.saved.measurement) return stay({ ...changed, touched: true });
  const raised = raiseLooks(changed, { readingId: null }, ports);
  const step = save({ ...changed, looks: raised.looks }, group, values, raised.changes);
  const question = newQuestion(state, step.state);
  const shown = step.state.panel.kind === 'doubt' && openQuestion(step.state.looks) === null ? { ...step.state, panel: PAD } : step.state;
  return { ...step, state: question ? { ...step.state, panel: { kind: 'doubt', lookId: question.id } } : shown };
}

/** A new empty entry. Reading the other value of the stem does not answer for the one in doubt, unless it makes the doubt moot. */
function readAgain(state: EntryState, { lookId, quantity }: Extract<EntryEvent, { kind: 'read-again' }>): EntryStep {
  const look = state.looks.find(({ id }) => id === lookId);
  const answers = look !== undefined && (look.quantity === quantity || look.suggestedQuantity === quantity);
  return stay({ ...state, focus: quantity, panel: PAD, unreadable: null, typing: { quantity, digits: '', purpose: 'again', lookId: answers ? lookId : null } });
}

function takeSuggestion(state: EntryState, lookId: string, ports: EntryPorts): EntryStep {
  const look = state.looks.find(({ id }) => id === lookId);
  if (!look || look.suggestedDigits === null || look.suggestedQuantity === null) return stay(state);
  const step = stand(state, look.suggestedQuantity, look.suggestedDigits, 'converted', { lookId, answer: 'converted' }, ports);
  return { ...step, state: afterAnswer(step.state) };
}

function accept(state: EntryState, event: Extract<EntryEvent, { kind: 'accept' }>, ports: EntryPorts): EntryStep {
  const { looks, changes } = answerLook(state.looks, event.lookId, { answer: 'accepted', reason: event.reason, answerNote: event.note.trim() }, ports);
  return { state: afterAnswer({ ...state, looks }), changes, done: false };
}

/** Leaving the stem: what is typed stands. Nobody said that it was measured again, so that is not claimed. */
function close(state: EntryState, ports: EntryPorts): EntryStep {
  const origin = state.panel.kind === 'origin' && state.typing ? chooseOrigin(state, 'retyped', ports) : null;
  let step = origin ?? settleTyping(state, ports);
  if (step.state.panel.kind === 'origin') step = chooseOrigin(step.state, 'retyped', ports);
  // A lone decimal sign is no value and must not bar the way.
  if (step.state.unreadable) step = stay({ ...step.state, typing: null, unreadable: null });
  const whole = step.state.touched && !step.state.saved.measurement ? save(step.state, 'species', {}, []) : step;
  return { state: { ...whole.state, panel: PAD, goesOn: null }, changes: whole.changes, done: true };
}

/** One event at the entry card: the state after it and the changes to be saved. Pure. */
export function transition(before: EntryState, event: EntryEvent, ports: EntryPorts): EntryStep {
  const goesOn = event.kind === 'type' || event.kind === 'key' || event.kind === 'erase' || event.kind === 'leave';
  const state = goesOn ? before : { ...before, goesOn: null };
  switch (event.kind) {
    case 'type':
      return type(state, event.quantity, event.digits);
    case 'key':
      return type(state, state.focus, (beginTyping(state, state.focus).digits) + event.key);
    case 'erase':
      return type(state, state.focus, beginTyping(state, state.focus).digits.slice(0, -1));
    case 'pause': {
      if (!state.typing || state.typing.digits === '' || /[.,]$/.test(state.typing.digits)) return stay(state);
      const step = asked(state, settleTyping(state, ports));
      return { ...step, state: { ...step.state, goesOn: step.state.typing ? null : state.typing.quantity } };
    }
    case 'leave':
      return state.typing?.quantity === event.quantity && state.panel.kind !== 'origin' ? asked(state, settleTyping(state, ports)) : stay(state);
    case 'next':
      return next(state, ports);
    case 'focus': {
      const left = state.typing && state.typing.quantity !== event.quantity ? settleTyping(state, ports) : stay(state);
      if (left.state.unreadable || left.state.panel.kind === 'origin') return left;
      const question = newQuestion(state, left.state);
      return { ...left, state: { ...left.state, focus: event.quantity, panel: question ? { kind: 'doubt', lookId: question.id } : PAD } };
    }
    case 'species':
      return resave(state, 'species', { speciesId: event.speciesId }, ports);
    case 'form': {
      const step = resave(state, 'stem', { status: event.status, form: event.form }, ports);
      return step.state.panel.kind === 'form' ? { ...step, state: { ...step.state, panel: PAD } } : step;
    }
    case 'read-again':
      return readAgain(state, event);
    case 'origin':
      return chooseOrigin(state, event.origin, ports);
    case 'take-suggestion':
      return takeSuggestion(state, event.lookId, ports);
    case 'accept':
      return accept(state, event, ports);
    case 'show':
      return stay({ ...state, panel: event.panel });
    case 'close':
      return close(state, ports);
  }
}

/** After a value came to stand by itself: the question it raised is asked, once. */
function asked(before: EntryState, step: EntryStep): EntryStep {
  const question = newQuestion(before, step.state);
  return question && step.state.panel.kind !== 'origin' ? { ...step, state: { ...step.state, panel: { kind: 'doubt', lookId: question.id } } } : step;
}
