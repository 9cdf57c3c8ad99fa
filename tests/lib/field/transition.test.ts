import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { cleanDigits } from '@/app/(field)/field/_entry/transition';
import type { EntryEvent } from '@/app/(field)/field/_entry/types';
import type { StemEntry } from '@/lib/checks/types';
import { card, plainDoubt } from './entry-builder';

const NEXT = { kind: 'next' } as const;
const PAUSE = { kind: 'pause' } as const;

/** A tree with DBH 25.3 and a height of 78, which is doubted. */
const doubted = () => card().keys('25.3').send(NEXT).keys('78').send(NEXT);

describe('typing', () => {
  it('12,5 and 12.5 are both 12.5, never 125', () => {
    for (const digits of ['12,5', '12.5']) {
      const { measurement } = card().keys(digits).send(PAUSE).state();
      expect(measurement.dbhCm).toBe(12.5);
      expect(measurement.dbhDigits).toBe(digits);
    }
  });

  it('243 is 243: a decimal sign is typed, never implied', () => {
    expect(card().keys('243').send(PAUSE).state().measurement.dbhCm).toBe(243);
  });

  it('a second decimal sign is not taken, nor anything that is no figure', () => {
    expect(card().keys('1,2.3').state().typing?.digits).toBe('1,23');
    expect(cleanDigits('a1 2,5b,')).toBe('12,5');
  });

  it('nothing is saved and nothing asked while digits are being typed', () => {
    const entry = card().keys('25.3').send(NEXT).keys('78');
    expect(entry.state().panel.kind).toBe('pad');
    expect(entry.state().looks).toEqual([]);
    expect(entry.state().measurement.heightM).toBeNull();
  });

  it('after a pause the value stands, and a key goes on with it: 2, pause, 5 is 25', () => {
    const entry = card().keys('2').send(PAUSE);
    expect(entry.state().measurement.dbhCm).toBe(2);
    entry.keys('5').send(PAUSE);
    expect(entry.state().measurement.dbhCm).toBe(25);
    expect(entry.readings()).toEqual(['dbh 2 first', 'dbh 25 retyped']);
  });

  it('12 pause ,5 is 12.5 and never 0.5 or 125', () => {
    expect(card().keys('12').send(PAUSE).keys(',5').send(PAUSE).state().measurement.dbhCm).toBe(12.5);
  });

  it('a pause after the decimal sign waits for what comes', () => {
    const entry = card().keys('12,').send(PAUSE);
    expect(entry.state().measurement.dbhCm).toBeNull();
    expect(entry.state().typing?.digits).toBe('12,');
  });

  it('a field that was left and is touched again starts a new entry; the old reading stays', () => {
    const entry = card().keys('25').send(NEXT, { kind: 'focus', quantity: 'dbh' }).keys('31').send(NEXT);
    expect(entry.state().measurement.dbhCm).toBe(31);
    expect(entry.readings()).toEqual(['dbh 25 first', 'dbh 31 retyped']);
  });

  it('erasing a new entry to nothing leaves the standing value as it is', () => {
    const entry = card().keys('25').send(NEXT, { kind: 'focus', quantity: 'dbh' }).keys('3').send({ kind: 'erase' }, NEXT);
    expect(entry.state().measurement.dbhDigits).toBe('25');
  });
});

describe('what is saved', () => {
  it('the first value that stands makes tree, stem, measurement and reading together, parents first', () => {
    const entry = card().keys('25.3').send(PAUSE);
    expect(entry.changes().map(({ entity, kind }) => `${kind} ${entity}`)).toEqual(['create tree', 'create stem', 'create stemMeasurement', 'create reading']);
  });

  it('later values set their own group only', () => {
    const entry = card().keys('25.3').send(NEXT).keys('21').send(PAUSE);
    const last = entry.changes().slice(-2);
    expect(last[0]).toMatchObject({ entity: 'stemMeasurement', kind: 'set', group: 'height', values: { heightDigits: '21', heightM: 21, heightUnit: 'm', heightMethod: 'measured' } });
    expect(last[1]).toMatchObject({ entity: 'reading', kind: 'create' });
  });

  it('who measured and who recorded is on each reading', () => {
    expect(card().keys('25.3').send(PAUSE).state().readings[0]).toMatchObject({ measurerId: 'measurer', recorderId: 'recorder', unit: 'cm', canonical: 25.3 });
  });

  it('a value typed in inches keeps its digits and unit beside the cm', () => {
    const { measurement } = card({ dbhUnit: 'in', lengthUnit: 'ft' }).keys('14').send(NEXT).keys('80').send(PAUSE).state();
    // 1 in = 2.54 cm and 1 ft = 0.3048 m exactly (international inch and foot, 1959).
    expect(measurement).toMatchObject({ dbhDigits: '14', dbhUnit: 'in', dbhCm: 14 * 2.54, heightDigits: '80', heightUnit: 'ft', heightM: 80 * 0.3048 });
  });

  it('a species touched by mistake leaves no tree behind, but going on with it does make one', () => {
    const touched = card().send({ kind: 'species', speciesId: 's' });
    expect(touched.changes()).toEqual([]);
    touched.send({ kind: 'close' });
    expect(touched.made('tree')).toHaveLength(1);
    expect(card().send({ kind: 'close' }).changes()).toEqual([]);
  });

  it('next leads from DBH to height to the next tree', () => {
    const entry = card().keys('25').send(NEXT);
    expect(entry.state().focus).toBe('height');
    expect(entry.done()).toBe(false);
    expect(entry.keys('20').send(NEXT).done()).toBe(true);
  });
});

describe('a doubt', () => {
  it('is asked when the value stands, with one look raised beside the reading it is about', () => {
    const entry = doubted();
    expect(entry.question()).toMatchObject({ rule: 'test-too-tall', enteredDigits: '78', answer: 'open', raisedBy: 'device' });
    expect(entry.question()?.readingId).toBe(entry.state().measurement.heightReadingIds[0]);
    expect(entry.done()).toBe(false);
  });

  it('read again with the same value is measured again, the best answer, with no more questions', () => {
    const entry = doubted();
    entry.send({ kind: 'read-again', lookId: entry.question()!.id, quantity: 'height' });
    expect(entry.state().typing).toMatchObject({ digits: '', purpose: 'again' });
    expect(entry.state().measurement.heightDigits).toBe('78');
    entry.keys('78').send(NEXT);
    expect(entry.answers()).toEqual(['78 measured-again']);
    expect(entry.readings()).toEqual(['dbh 25.3 first', 'height 78 first', 'height 78 again']);
    expect(entry.state().panel.kind).toBe('pad');
  });

  it.each([['again', 'measured-again'], ['retyped', 'read-again']] as const)('read again with another value asks how it came: %s is %s', (origin, answer) => {
    const entry = doubted();
    entry.send({ kind: 'read-again', lookId: entry.question()!.id, quantity: 'height' }).keys('23.8').send(NEXT);
    expect(entry.state().panel.kind).toBe('origin');
    expect(entry.state().measurement.heightDigits).toBe('78');
    entry.send({ kind: 'origin', origin });
    expect(entry.state().measurement.heightM).toBe(23.8);
    expect(entry.answers()).toEqual([`78 ${answer}`]);
    expect(entry.state().looks[0]?.answerReadingId).toBe(entry.state().readings.at(-1)?.id);
    expect(entry.readings().at(-1)).toBe(`height 23.8 ${origin}`);
  });

  it('going on without saying how a changed value came claims no second measurement', () => {
    const entry = doubted();
    entry.send({ kind: 'read-again', lookId: entry.question()!.id, quantity: 'height' }).keys('23.8').send({ kind: 'close' });
    expect(entry.answers()).toEqual(['78 read-again']);
    expect(entry.readings().at(-1)).toBe('height 23.8 retyped');
    expect(entry.done()).toBe(true);
  });

  it('the suggested value is a reading of its own, converted, and answers the doubt', () => {
    const entry = doubted();
    entry.send({ kind: 'take-suggestion', lookId: entry.question()!.id });
    expect(entry.answers()).toEqual(['78 converted']);
    expect(entry.readings().at(-1)).toBe('height 23.8 converted');
    expect(entry.state().panel.kind).toBe('pad');
  });

  it('kept with a reason, it is not asked again for the same digits', () => {
    const entry = doubted();
    entry.send({ kind: 'accept', lookId: entry.question()!.id, reason: 'other', note: ' giant ' }, { kind: 'form', status: 'live', form: 'whole' });
    expect(entry.state().looks).toMatchObject([{ answer: 'accepted', reason: 'other', answerNote: 'giant', answeredById: 'author' }]);
    expect(entry.state().panel.kind).toBe('pad');
  });

  it('a still doubtful second value is a new doubt of its own', () => {
    const entry = doubted();
    entry.send({ kind: 'read-again', lookId: entry.question()!.id, quantity: 'height' }).keys('88').send(NEXT, { kind: 'origin', origin: 'again' });
    expect(entry.answers()).toEqual(['78 measured-again', '88 open']);
    expect(entry.question()?.enteredDigits).toBe('88');
  });

  it('is withdrawn, with the reading that made it moot, when another value makes it so', () => {
    const thinOnly = (stem: StemEntry) => (stem.dbhCm !== null && stem.dbhCm < 50 ? plainDoubt(stem, 'look') : []);
    const entry = card({ check: thinOnly }).keys('25').send(NEXT).keys('78').send(NEXT, { kind: 'focus', quantity: 'dbh' }).keys('250').send(NEXT);
    expect(entry.answers()).toEqual(['78 withdrawn']);
    expect(entry.state().looks[0]?.answerReadingId).toBe(entry.state().measurement.dbhReadingIds[0]);
  });

  it('reading the other value again, the same, does not answer it', () => {
    const entry = doubted();
    entry.send({ kind: 'read-again', lookId: entry.question()!.id, quantity: 'dbh' }).keys('25.3').send(NEXT);
    expect(entry.answers()).toEqual(['78 open']);
    expect(entry.question()).not.toBeNull();
    expect(entry.readings().at(-1)).toBe('dbh 25.3 again');
  });

  it('never bars the way: the next tree is there while it is open, and it stays open', () => {
    const entry = doubted().send({ kind: 'close' });
    expect(entry.done()).toBe(true);
    expect(entry.answers()).toEqual(['78 open']);
  });

  it('a quiet mark asks nothing', () => {
    const entry = card({ check: (stem) => plainDoubt(stem, 'quiet') }).keys('25').send(NEXT).keys('78').send(NEXT);
    expect(entry.done()).toBe(true);
    expect(entry.state().looks).toMatchObject([{ level: 'quiet', answer: 'open' }]);
  });
});

describe('whatever is touched in whatever order', () => {
  const event: fc.Arbitrary<EntryEvent> = fc.oneof(
    fc.constantFrom('0', '1', '7', '9', ',', '.').map((key) => ({ kind: 'key', key }) as const),
    fc.constantFrom<EntryEvent>({ kind: 'erase' }, PAUSE, NEXT, { kind: 'close' }, { kind: 'focus', quantity: 'dbh' }, { kind: 'focus', quantity: 'height' },
      { kind: 'leave', quantity: 'height' }, { kind: 'origin', origin: 'again' }, { kind: 'origin', origin: 'retyped' }, { kind: 'form', status: 'dead', form: 'broken' }, { kind: 'species', speciesId: 's' }),
    fc.constantFrom('read', 'take', 'accept').map((what) => ({ kind: 'show', panel: { kind: what as 'pad' } }) as EntryEvent),
  );

  it('each record is made once, every standing value has its reading, and no reading is lost', () => {
    fc.assert(fc.property(fc.array(event, { maxLength: 40 }), (events) => {
      const entry = card();
      for (const one of events) {
        const look = entry.state().looks.find(({ answer }) => answer === 'open');
        const answering = one.kind === 'show' && look ? ({
          read: { kind: 'read-again', lookId: look.id, quantity: 'height' }, take: { kind: 'take-suggestion', lookId: look.id },
          accept: { kind: 'accept', lookId: look.id, reason: 'read-twice', note: '' },
        } as Record<string, EntryEvent>)[one.panel.kind]! : one;
        if (answering.kind !== 'show') entry.send(answering);
      }
      const made = entry.changes().filter(({ kind }) => kind === 'create').map(({ recordId }) => recordId);
      expect(new Set(made).size).toBe(made.length);
      const { measurement, readings } = entry.state();
      expect(entry.made('reading')).toHaveLength(readings.length);
      for (const [digits, ids] of [[measurement.dbhDigits, measurement.dbhReadingIds], [measurement.heightDigits, measurement.heightReadingIds]] as const) {
        if (digits === null) continue;
        expect(readings.find(({ id }) => id === ids.at(-1))?.digits).toBe(digits);
      }
    }), { numRuns: 300 });
  });
});
