import type { Doubt, StemEntry } from '@/lib/checks/types';
import { toCanonicalCm, toCanonicalM } from '@/lib/trees/units';
import { parseDigits } from '@/lib/trees/parse-digits';
import type { RecordChange } from '@/lib/schema/record-change';
import { beginNewTree } from '@/app/(field)/field/_entry/begin-entry';
import { transition } from '@/app/(field)/field/_entry/transition';
import type { EntryEvent, EntryPorts, EntryState } from '@/app/(field)/field/_entry/types';

/** Ids that count up, valid as UUIDv7. */
export function countingIds(): () => string {
  let n = 0;
  return () => `01900000-0000-7000-8000-${String(++n).padStart(12, '0')}`;
}

export const PLACE = { projectId: 'p', plotId: 'plot', visitId: 'visit', order: 1 } as const;

/** A height doubt of a simple rule: above 50 m, with a suggestion as if it had been feet. */
export function tooTall(stem: StemEntry): readonly Doubt[] {
  if (stem.heightM === null || stem.heightM <= 50) return [];
  const digits = (stem.heightM * 0.3048).toFixed(1);
  return [{
    rule: 'test-too-tall', moment: 'tape', level: 'look', quantity: 'height', enteredDigits: stem.heightDigits, enteredCanonical: stem.heightM,
    expectedLow: 10, expectedHigh: 30, tailProbability: 0.0001, cause: 'height-other-unit', causeProbability: 0.9,
    suggestion: { quantity: 'height', digits, canonical: Number(digits) },
  }];
}

/** A height above 50 m, doubted at a level, without a cause. */
export function plainDoubt(stem: StemEntry, level: Doubt['level']): readonly Doubt[] {
  if (stem.heightM === null || stem.heightM <= 50) return [];
  return [{
    rule: 'test-plain', moment: 'tape', level, quantity: 'height', enteredDigits: stem.heightDigits, enteredCanonical: stem.heightM, expectedLow: null,
    expectedHigh: null, tailProbability: null, cause: null, causeProbability: null, suggestion: null,
  }];
}

/** An entry card without a screen: events go in, the state and all changes can be looked at. */
export function card({ check = tooTall, dbhUnit = 'cm', lengthUnit = 'm' }: { check?: EntryPorts['check']; dbhUnit?: 'cm' | 'in'; lengthUnit?: 'm' | 'ft' } = {}) {
  const newId = countingIds();
  let second = 0;
  const ports: EntryPorts = {
    newId, now: () => new Date(Date.UTC(2026, 5, 1, 8, 0, second++)).toISOString(), authorId: 'author', measurerId: 'measurer', recorderId: 'recorder',
    dbhUnit, lengthUnit, curveGroup: () => 'spruce', check,
    parse: (digits) => {
      const parsed = parseDigits(digits);
      return parsed.kind === 'value' ? parsed.value : null;
    },
    canonical: (quantity, value) => (quantity === 'dbh' ? toCanonicalCm(value, dbhUnit) : toCanonicalM(value, lengthUnit)),
  };
  let state: EntryState = beginNewTree(PLACE, '1', { tree: newId(), stem: newId(), measurement: newId() });
  const changes: RecordChange[] = [];
  let done = false;
  const self = {
    send: (...events: readonly EntryEvent[]) => {
      for (const event of events) {
        const step = transition(state, event, ports);
        state = step.state;
        changes.push(...step.changes);
        done = step.done;
      }
      return self;
    },
    keys: (digits: string) => self.send(...[...digits].map((key) => ({ kind: 'key', key }) as const)),
    state: () => state,
    done: () => done,
    changes: () => changes,
    made: (entity: RecordChange['entity']) => changes.filter((change) => change.entity === entity && change.kind === 'create'),
    readings: () => state.readings.map(({ quantity, digits, origin }) => `${quantity} ${digits} ${origin}`),
    answers: () => state.looks.map(({ enteredDigits, answer }) => `${enteredDigits ?? ''} ${answer}`),
    question: () => (state.panel.kind === 'doubt' ? state.looks.find(({ id }) => state.panel.kind === 'doubt' && id === state.panel.lookId)! : null),
  };
  return self;
}
