import { existsSync } from 'node:fs';
import { createServer } from 'node:http';
import type { Server } from 'node:http';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { EnvironmentError, readEnvironment } from '@/lib/server/env';
import { addressHeader, clientAddress } from '@/lib/server/rate-limit-address';
import { writesSettled } from '@/lib/server/write-queue';
import { closeDatabase, openDatabase } from '@/models';
import { migrate } from '@/models/migrate';
import { stopOnSignals } from './stop-on-signals';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

/** The server cannot start; the message says what to do about it. */
export class StartError extends Error {
  override readonly name = 'StartError';
}

export type RunningServer = { readonly address: string; readonly server: Server; close(): Promise<void> };

/** Time that requests under way have to end when the server is told to stop. */
const GRACE_MS = 10_000;

function listen(server: Server, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => {
      reject(error.code === 'EADDRINUSE'
        ? new StartError(`Port ${port} is taken. Stop what uses it, or choose another: PORT=${port + 1}`)
        : error);
    });
    server.listen(port, resolve);
  });
}

/**
 * Serves in this one process: environment checked, database migrated and opened, then the pages.
 * Errors: EnvironmentError, StartError (no build, port taken), those of migrate and openDatabase.
 */
export async function startServer({ dev = false }: { dev?: boolean } = {}): Promise<RunningServer> {
  process.chdir(root);
  // The pool's size is fixed before this file runs; four threads would let a few slow queries hold up all file access.
  if (process.env.UV_THREADPOOL_SIZE === undefined) console.warn('UV_THREADPOOL_SIZE is not set: start with npm start, or set it to 16.');
  if (existsSync('.env')) process.loadEnvFile('.env');
  Object.assign(process.env, { NODE_ENV: dev ? 'development' : 'production', NEXT_TELEMETRY_DISABLED: '1' });
  const environment = readEnvironment();
  process.env.NEXTAUTH_URL ??= environment.origin;
  const { port, https, trustedProxies, dist } = environment;
  if (!dev && !existsSync(path.join(root, dist, 'BUILD_ID'))) throw new StartError(`There is no build in ${dist}. Make one with: npm run build`);

  const { applied, backup } = await migrate();
  if (backup) console.log(`Copied the database as it was to ${backup}`);
  if (applied.length > 0) console.log(`Migrated the database: ${applied.join(', ')}`);
  await openDatabase();

  const { default: next } = await import('next');
  const server = createServer();
  const app = next({ dev, dir: root, port, httpServer: server });
  let prepared = (): void => undefined;
  const ready = new Promise<void>((resolve) => { prepared = resolve; });
  // Requests that come while the pages are being prepared wait; without a listener they would hang for ever.
  server.on('request', (request, response) => {
    const forwarded = request.headers['x-forwarded-for'];
    request.headers[addressHeader()] = clientAddress(request.socket.remoteAddress, Array.isArray(forwarded) ? forwarded.join(',') : forwarded, trustedProxies);
    if (https && !dev) response.setHeader('Strict-Transport-Security', 'max-age=63072000; includeSubDomains');
    ready.then(() => app.getRequestHandler()(request, response)).catch((error: unknown) => {
      console.error(`[server] ${request.method} ${request.url}`, error);
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });

  await listen(server, port);
  await app.prepare();
  prepared();

  const close = async () => {
    const closed = new Promise<void>((resolve) => { server.close(() => resolve()); });
    server.closeIdleConnections();
    const late = setTimeout(() => server.closeAllConnections(), GRACE_MS);
    await closed;
    clearTimeout(late);
    await app.close();
    await writesSettled();
    await closeDatabase();
  };
  return { address: `http://localhost:${port}`, server, close };
}

async function main(): Promise<void> {
  try {
    const running = await startServer({ dev: process.argv.includes('--dev') });
    console.log(`Lammas is served at ${running.address}`);
    stopOnSignals(running);
  } catch (error) {
    const expected = error instanceof StartError || error instanceof EnvironmentError;
    console.error(expected ? error.message : error);
    process.exit(1);
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) await main();
