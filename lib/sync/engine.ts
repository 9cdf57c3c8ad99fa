import { GENESIS_HASH } from '@/lib/schema/wire';
import { initialSession, step } from './machine';
import type { Effect, SessionEvent, SessionState } from './machine';
import type { LockPort, PushAnswer, SyncStore, Transport } from './ports';

export type EnginePorts = {
  readonly store: SyncStore;
  readonly transport: Transport;
  readonly lock: LockPort;
  /** Calls back once after a time; the result stops it. */
  readonly later: (ms: number, callback: () => void) => () => void;
  /** Uniform in [0, 1). */
  readonly random: () => number;
  readonly report: (state: SessionState) => void;
  /** What happened that nobody is told on screen. */
  readonly log: (what: string, cause?: unknown) => void;
};

/** Runs sessions over a device's store. One effect at a time; no transaction is held while a request is under way. */
export class SyncEngine {
  #state = initialSession;
  #stopWaiting: (() => void) | null = null;
  #release: (() => void) | null = null;
  #running: Promise<void> | null = null;
  readonly #waiting: SessionEvent[] = [];
  /** Projects that this session has brought up to date, or has no access to. */
  readonly #done = new Set<string>();

  constructor(readonly ports: EnginePorts) {}

  get state(): SessionState {
    return this.#state;
  }

  /** Hands in an event; resolves when all that follows from it, waits apart, is done. */
  send(event: Extract<SessionEvent, { kind: 'wanted' | 'signed-in' | 'due' }>): Promise<void> {
    this.#waiting.push(event);
    this.#running ??= this.#run();
    return this.#running;
  }

  stop(): void {
    this.#stopWaiting?.();
    this.#stopWaiting = null;
  }

  async #run(): Promise<void> {
    const effects: Effect[] = [];
    for (;;) {
      // Events from outside come first: a save during a pull is sent in the same session.
      const event = this.#waiting.shift() ?? (await this.#nextOf(effects));
      if (event === null) {
        // One may have been handed in since the question was asked.
        if (this.#waiting.length > 0) continue;
        this.#running = null;
        return;
      }
      const next = step(this.#state, event, this.ports.random());
      if (next.effects.some(({ kind }) => kind === 'lock')) this.#done.clear();
      this.#state = next.state;
      effects.push(...next.effects);
      this.ports.report(this.#state);
    }
  }

  /** Does what is asked until something comes of it; null when there is nothing left to do. */
  async #nextOf(effects: Effect[]): Promise<SessionEvent | null> {
    for (let effect = effects.shift(); effect; effect = effects.shift()) {
      const event = await this.#perform(effect).catch((cause: unknown): SessionEvent => {
        this.ports.log('the device store failed during sync', cause);
        return { kind: 'failed', failure: 'refused' };
      });
      if (event) return event;
    }
    return this.#waiting.shift() ?? null;
  }

  async #perform(effect: Effect): Promise<SessionEvent | null> {
    switch (effect.kind) {
      case 'lock':
        this.stop();
        this.#release = await this.ports.lock.take();
        return { kind: this.#release ? 'lock-taken' : 'lock-busy' };
      case 'unlock':
        this.#release?.();
        this.#release = null;
        return null;
      case 'wait':
        this.stop();
        this.#stopWaiting = this.ports.later(effect.ms, () => void this.send({ kind: 'due' }));
        return null;
      case 'probe': {
        const answer = await this.ports.transport.probe();
        return answer.kind === 'ok' ? { kind: 'reached' } : { kind: 'failed', failure: answer.kind };
      }
      case 'push':
        return this.#push(effect.limit);
      case 'rename':
        this.ports.log('this device was copied or set back; it goes on under a new id');
        await this.ports.store.rename();
        return { kind: 'rewound' };
      case 'pull':
        return this.#pull();
      case 'refetch':
        return this.#refetch();
      case 'finish':
        await this.ports.store.finished();
        return null;
    }
  }

  async #push(limit: number): Promise<SessionEvent> {
    const { store, transport } = this.ports;
    const request = await store.batch(limit);
    if (!request) return { kind: 'pushed', more: false };
    const answer: PushAnswer = await transport.push(request);
    if (answer.kind === 'ok') return { kind: (await store.acknowledge(answer.reply)) === 'taken' ? 'pushed' : 'forked', more: true };
    if (answer.kind !== 'problem') return { kind: 'failed', failure: answer.kind };
    if (answer.problem.code === 'fork') return { kind: 'forked' };
    return { kind: (await store.rewind(answer.problem)) === 'taken' ? 'rewound' : 'forked' };
  }

  /** One page of one project. */
  async #pull(): Promise<SessionEvent> {
    const { store, transport } = this.ports;
    const open = (await store.projects()).filter(({ projectId }) => !this.#done.has(projectId));
    const [project] = open;
    if (!project) return { kind: 'pulled', more: false };
    if (project.stale) return { kind: 'diverged' };
    const answer = await transport.pull(project.projectId, project.cursor);
    if (answer.kind === 'denied') {
      this.#done.add(project.projectId);
      return { kind: 'pulled', more: open.length > 1 };
    }
    if (answer.kind !== 'ok') return { kind: 'failed', failure: answer.kind };
    if (await this.#otherEpoch(answer.reply.epoch)) return { kind: 'rewound' };
    const taken = await store.absorbPage(project.cursor, answer.reply);
    if (taken === 'diverged') {
      this.ports.log(`the copy of project ${project.projectId} differs from the server's; it is fetched anew`);
      return { kind: 'diverged' };
    }
    if (!answer.reply.more) this.#done.add(project.projectId);
    return { kind: 'pulled', more: answer.reply.more || open.length > 1 };
  }

  /** Heard while pulling, when nothing is known of what the restored server has of us: all is sent again, and what it has is answered as before. */
  async #otherEpoch(epoch: string): Promise<boolean> {
    const known = await this.ports.store.epoch();
    if (known === null || known === epoch) return false;
    await this.ports.store.rewind({ code: 'epoch', epoch, ackSeq: 0, ackHash: GENESIS_HASH });
    return true;
  }

  async #refetch(): Promise<SessionEvent> {
    const { store, transport } = this.ports;
    const project = (await store.projects()).find(({ projectId, stale }) => stale && !this.#done.has(projectId));
    if (!project) return { kind: 'pulled', more: true };
    const answer = await transport.pack(project.projectId);
    if (answer.kind === 'denied') this.#done.add(project.projectId);
    else if (answer.kind !== 'ok') return { kind: 'failed', failure: answer.kind };
    else if (await this.#otherEpoch(answer.reply.epoch)) return { kind: 'rewound' };
    else await store.absorbPack(answer.reply);
    return { kind: 'pulled', more: true };
  }
}
