import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LONGEST_WAIT_MS, initialSession, sessionTable, step, waitMs } from '@/lib/sync/machine';
import type { Phase, SessionEvent, SessionState } from '@/lib/sync/machine';
import type { Failure } from '@/lib/sync/ports';

const events: readonly SessionEvent[] = [
  { kind: 'wanted' }, { kind: 'lock-taken' }, { kind: 'lock-busy' }, { kind: 'reached' }, { kind: 'pushed', more: true }, { kind: 'pushed', more: false },
  { kind: 'forked' }, { kind: 'rewound' }, { kind: 'pulled', more: true }, { kind: 'pulled', more: false }, { kind: 'diverged' }, { kind: 'due' }, { kind: 'signed-in' },
  ...(['offline', 'not-ours', 'too-big', 'server', 'busy', 'sign-in', 'denied', 'refused'] as const).map((failure): SessionEvent => ({ kind: 'failed', failure })),
];
const fail = (failure: Failure): SessionEvent => ({ kind: 'failed', failure });
const at = (phase: Phase, more: Partial<SessionState> = {}): SessionState => ({ ...initialSession, phase, ...more });
const run = (from: SessionState, ...list: SessionEvent[]) => list.reduce((last, event) => step(last.state, event, 0.5), { state: from, effects: [] } as ReturnType<typeof step>);

describe('the session (rule 8)', () => {
  it('goes idle → lock → probe → push → pull → idle, and lets the lock go', () => {
    const { state, effects } = run(initialSession, { kind: 'wanted' }, { kind: 'lock-taken' }, { kind: 'reached' }, { kind: 'pushed', more: true }, { kind: 'pushed', more: false }, { kind: 'pulled', more: true }, { kind: 'pulled', more: false });
    expect(state).toEqual(initialSession);
    expect(effects).toEqual([{ kind: 'finish' }, { kind: 'unlock' }]);
  });

  it('is idle again when another tab has the lock', () => {
    expect(run(initialSession, { kind: 'wanted' }, { kind: 'lock-busy' })).toEqual({ state: initialSession, effects: [] });
  });

  it.each(['too-big', 'server'] as const)('%s halves the push, down to one operation, then backs off (rule 3)', (failure) => {
    let state = at('pushing');
    const limits: number[] = [];
    while (state.phase === 'pushing') {
      limits.push(state.limit);
      ({ state } = step(state, fail(failure), 0.5));
    }
    expect(limits).toEqual([500, 250, 125, 62, 31, 15, 7, 3, 1]);
    expect(state).toMatchObject({ phase: 'backing-off', problem: failure });
    expect(run(at('pushing', { limit: 1 }), { kind: 'pushed', more: true }).state.limit).toBe(2);
  });

  it('401 stops the session until somebody signs in; the clock and saves do not start it', () => {
    for (const phase of ['probing', 'pushing', 'pulling'] as const) {
      const { state, effects } = run(at(phase), fail('sign-in'));
      expect([state.phase, effects]).toEqual(['sign-in-needed', [{ kind: 'unlock' }]]);
      expect(run(state, { kind: 'wanted' }, { kind: 'due' }).effects).toEqual([]);
      expect(run(state, { kind: 'signed-in' }).effects).toEqual([{ kind: 'lock' }]);
    }
  });

  it('a fork leads to a new device id and then to a push', () => {
    expect(run(at('pushing'), { kind: 'forked' }).effects).toEqual([{ kind: 'rename' }]);
    expect(run(at('pushing'), { kind: 'forked' }, { kind: 'rewound' }).effects).toEqual([{ kind: 'push', limit: 500 }]);
  });

  it('a server that asks for repairs for ever is backed off from', () => {
    expect(run(at('pushing'), ...Array<SessionEvent>(30).fill({ kind: 'rewound' })).state).toMatchObject({ phase: 'backing-off', problem: 'diverged' });
    expect(run(at('pulling'), ...Array<SessionEvent>(30).fill({ kind: 'diverged' })).state).toMatchObject({ phase: 'backing-off', problem: 'diverged' });
  });

  it('what was saved during a session is pushed before it ends', () => {
    expect(run(at('pulling'), { kind: 'wanted' }, { kind: 'pulled', more: false }).effects).toEqual([{ kind: 'push', limit: 500 }]);
  });

  it('every phase takes every event: a failure or the end lets the lock go, and no phase is left without a way on', () => {
    for (const phase of Object.keys(sessionTable) as Phase[]) {
      for (const event of events) {
        const { state, effects } = step(at(phase), event, 0.3);
        const rests = ['idle', 'backing-off', 'sign-in-needed'].includes(state.phase);
        const held = ['probing', 'pushing', 'pulling'].includes(phase);
        expect(effects.some(({ kind }) => kind === 'unlock'), `${phase} ${event.kind}`).toBe((held || phase === 'locking') && rests && event.kind !== 'lock-busy');
        if (state.phase === 'backing-off' && phase !== 'backing-off') expect(effects.some(({ kind }) => kind === 'wait')).toBe(true);
        if (!rests && state.phase !== phase) expect(effects.length, `${phase} ${event.kind}`).toBeGreaterThan(0);
      }
    }
  });

  it('waits between 1 s and 5 min, longer with each failure, spread over the whole range', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 1000 }), fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }), (failures, random) => {
      expect(waitMs(failures, random)).toBeGreaterThanOrEqual(1000);
      expect(waitMs(failures, random)).toBeLessThanOrEqual(LONGEST_WAIT_MS);
    }));
    expect([1, 2, 3, 9].map((failures) => waitMs(failures, 0.999999))).toEqual([2000, 4000, 8000, 300_000]);
    expect(waitMs(9, 0)).toBe(1000);
  });
});
