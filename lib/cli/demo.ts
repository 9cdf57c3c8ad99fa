// npm run demo: builds when the sources have changed, migrates, sows the demo into an empty database, serves.
import { existsSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { EnvironmentError, readEnvironment } from '@/lib/server/env';
import { dataFolder } from '@/models/data-folder';
import { migrate } from '@/models/migrate';
import { demoGreeting } from './demo/demo-greeting';
import { demoSecret } from './demo/demo-secret';
import { ensureBuilt } from './demo/ensure-built';
import { lanAddresses } from './demo/lan-addresses';
import { portIsFree } from './demo/port-is-free';
import { StartError, startServer } from './start';
import { stopOnSignals } from './stop-on-signals';

/** Readies the environment of a production server, with a secret of the demo's own where none is set. */
function readyEnvironment(): number {
  if (existsSync('.env')) process.loadEnvFile('.env');
  // Read once as development, which needs no secret, for the port.
  const { port } = readEnvironment({ ...process.env, NODE_ENV: 'development' });
  process.env.NEXTAUTH_SECRET ||= demoSecret(dataFolder());
  process.env.NEXTAUTH_URL ||= `http://localhost:${port}`;
  Object.assign(process.env, { NODE_ENV: 'production' });
  return port;
}

async function main(): Promise<void> {
  const port = readyEnvironment();
  // Asked before the build, which takes a minute.
  if (!(await portIsFree(port))) throw new StartError(`Port ${port} is taken. Stop what uses it, or choose another: PORT=${port + 1} npm run demo`);
  if (ensureBuilt() === 'failed') throw new StartError('The build failed; its own words stand above.');
  const { backup } = await migrate();
  if (backup) console.log(`Copied the database as it was to ${backup}`);
  const { seedDemo } = await import('@/seeders/seed-demo');
  const summary = await seedDemo();
  const running = await startServer();
  console.log(demoGreeting({ summary, port, lan: lanAddresses(), dataFolder: dataFolder() }));
  stopOnSignals(running);
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  await main().catch((error: unknown) => {
    console.error(error instanceof StartError || error instanceof EnvironmentError ? error.message : error);
    process.exit(1);
  });
}
