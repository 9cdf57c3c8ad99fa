// Plain JavaScript on purpose: the same file is started by the production build, by commands and by tests.
import { parentPort } from 'node:worker_threads';
import bcrypt from 'bcryptjs';

parentPort.on('message', ({ kind, password, hash, cost }) => {
  const result = kind === 'hash' ? bcrypt.hashSync(password, cost) : bcrypt.compareSync(password, hash);
  parentPort.postMessage(result);
});
