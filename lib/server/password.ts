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
type Pool = { idle: Worker[]; running: number; waiting: Job[] };

// One pool in the process, however often the bundler copies this module.
const shared = globalThis as typeof globalThis & { lammasBcryptPool?: Pool };

function pool(): Pool {
  return (shared.lammasBcryptPool ??= { idle: [], running: 0, waiting: [] });
}

function newWorker(): Worker {
  const file = path.join(/* turbopackIgnore: true */ process.cwd(), 'lib', 'server', 'bcrypt-worker.mjs');
  return new Worker(/* turbopackIgnore: true */ file, { execArgv: [] });
}

function startNext(): void {
  const current = pool();
  if (current.running >= MOST_WORKERS) return;
  const job = current.waiting.shift();
  if (!job) return;
  current.running += 1;
  const worker = current.idle.pop() ?? newWorker();
  // A working worker keeps a command alive until the answer is there; an idle one lets it end.
  worker.ref();
  const finish = (keep: boolean) => {
    worker.removeAllListeners();
    current.running -= 1;
    if (keep) { worker.unref(); current.idle.push(worker); }
    startNext();
  };
  worker.once('message', (result: string | boolean) => { finish(true); job.resolve(result); });
  worker.once('error', (error) => { finish(false); job.reject(error); });
  worker.once('exit', (code) => { finish(false); job.reject(new Error(`The password worker ended with ${code}.`)); });
  worker.postMessage(job.message);
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
