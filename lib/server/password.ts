import 'server-only';
import path from 'node:path';
import { Worker } from 'node:worker_threads';

/** About 0.23 s of a core for each password, for us and for whoever steals the table. */
export const BCRYPT_COST = 12;
/** bcrypt reads no further; a longer one would be cut without a word. */
export const MOST_PASSWORD_BYTES = 72;
/** Workers at once; more would leave no core for the rest. */
const MOST_WORKERS = 2;
const MOST_WAITING = 100;

type Job = { readonly message: object; resolve(result: string | boolean): void; reject(error: Error): void };
type Slot = { readonly worker: Worker; job: Job | null };
type Pool = { slots: Slot[]; waiting: Job[] };

// One pool in the process, however often the bundler copies this module.
const shared = globalThis as typeof globalThis & { lammasBcryptPool?: Pool };

function pool(): Pool {
  return (shared.lammasBcryptPool ??= { slots: [], waiting: [] });
}

function addSlot(): Slot {
  const file = path.join(/* turbopackIgnore: true */ process.cwd(), 'lib', 'server', 'bcrypt-worker.mjs');
  const slot: Slot = { worker: new Worker(/* turbopackIgnore: true */ file, { execArgv: [] }), job: null };
  const lost = (error: Error) => {
    pool().slots = pool().slots.filter((other) => other !== slot);
    slot.job?.reject(error);
    slot.job = null;
    startNext();
  };
  slot.worker.on('message', (result: string | boolean) => {
    slot.job?.resolve(result);
    slot.job = null;
    slot.worker.unref();
    startNext();
  });
  slot.worker.on('error', lost);
  slot.worker.on('exit', (code) => lost(new Error(`The password worker ended with ${code}.`)));
  pool().slots.push(slot);
  return slot;
}

function startNext(): void {
  const { slots, waiting } = pool();
  const slot = slots.find(({ job }) => job === null) ?? (slots.length < MOST_WORKERS && waiting.length > 0 ? addSlot() : null);
  const job = slot && waiting.shift();
  if (!slot || !job) return;
  slot.job = job;
  // A working worker keeps a command alive until the answer is there; an idle one lets it end.
  slot.worker.ref();
  slot.worker.postMessage(job.message);
}

function ask(message: object): Promise<string | boolean> {
  if (pool().waiting.length >= MOST_WAITING) return Promise.reject(new Error('Too many passwords wait to be checked.'));
  return new Promise((resolve, reject) => {
    pool().waiting.push({ message, resolve, reject });
    startNext();
  });
}

/** Whether bcrypt would read all of a password. */
export function fitsBcrypt(password: string): boolean {
  return Buffer.byteLength(password, 'utf8') <= MOST_PASSWORD_BYTES && !password.includes('\0');
}

/** The bcrypt hash of a password, made in a worker. Errors: longer than 72 bytes. */
export async function hashPassword(password: string): Promise<string> {
  if (!fitsBcrypt(password)) throw new Error(`A password may have at most ${MOST_PASSWORD_BYTES} bytes.`);
  return String(await ask({ kind: 'hash', password, cost: BCRYPT_COST }));
}

/** A hash of nobody's password, of the same cost, so that an unknown person takes as long as a known one. */
const NOBODY = '$2b$12$s8ouRmAKaNz7SbilC7E9b.BMFGY6Iy00E/nJrtEUKrd14tbuE0Nfy';

/** Whether a password is the one of a hash. Without a hash it takes the same time and says no. */
export async function verifyPassword(password: string, hash: string | null): Promise<boolean> {
  const tried = fitsBcrypt(password) ? password : '';
  const same = (await ask({ kind: 'compare', password: tried, hash: hash ?? NOBODY })) === true;
  return same && hash !== null && tried === password;
}
