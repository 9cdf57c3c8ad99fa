// Installs the packages when they are missing or not those of package-lock.json. Plain Node: it runs before anything is installed.
import { execFileSync, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { cpSync, existsSync, mkdtempSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const lockFile = path.join(root, 'package-lock.json');
const modules = path.join(root, 'node_modules');
const stampFile = path.join(modules, '.lammas-lock-sha256');

function stop(line) {
  console.error(line);
  process.exit(1);
}

function checkNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 9)) stop(`Lammas needs Node 20.9 or later; this is Node ${process.versions.node}.`);
}

const lockHash = () => createHash('sha256').update(readFileSync(lockFile)).digest('hex');

function isInstalled() {
  const installed = path.join(modules, '.package-lock.json');
  if (!existsSync(installed)) return false;
  // A fresh checkout gives files new times; the hash knows that nothing changed, and saves an installation that a camp without network cannot do.
  if (existsSync(stampFile)) return readFileSync(stampFile, 'utf8') === lockHash();
  return statSync(installed).mtimeMs >= statSync(lockFile).mtimeMs;
}

function missingTools() {
  const has = (command) => spawnSync(command, ['--version'], { stdio: 'ignore' }).status === 0;
  return [['python3'], ['make'], ['g++', 'c++', 'clang++']].filter((names) => !names.some(has)).map(([name]) => name);
}

function npmCi(folder) {
  const { npm_execpath: npm, ...inherited } = process.env;
  // What npm sets for the script that runs now names this folder; the installation may run in another.
  const env = Object.fromEntries(Object.entries(inherited).filter(([name]) => !/^(npm_package_|npm_lifecycle_|npm_config_local_prefix|INIT_CWD)/.test(name)));
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund'];
  const options = { cwd: folder, env, stdio: 'inherit' };
  const byNode = npm !== undefined && /\.c?js$/.test(npm);
  return byNode ? spawnSync(process.execPath, [npm, ...args], options) : spawnSync('npm', args, { ...options, shell: process.platform === 'win32' });
}

/** Make cannot compile sqlite3 below a folder whose name has a blank, so there the packages are installed elsewhere and moved in. */
function install() {
  if (!/[^\w\-./~+@:\\]/.test(root)) return npmCi(root).status === 0;
  const scratch = mkdtempSync(path.join(os.tmpdir(), 'lammas-install-'));
  if (/\s/.test(scratch)) stop(`Neither ${root} nor ${scratch} can hold sqlite3 while it is compiled: put Lammas in a folder without blanks, or set TMPDIR to one.`);
  try {
    for (const name of ['package.json', 'package-lock.json', '.npmrc']) cpSync(path.join(root, name), path.join(scratch, name));
    if (npmCi(scratch).status !== 0) return false;
    rmSync(modules, { recursive: true, force: true });
    try {
      renameSync(path.join(scratch, 'node_modules'), modules);
    } catch (error) {
      if (error.code !== 'EXDEV') throw error;
      cpSync(path.join(scratch, 'node_modules'), modules, { recursive: true, verbatimSymlinks: true });
    }
    return true;
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

function loads(name) {
  try {
    execFileSync(process.execPath, ['-e', `require(${JSON.stringify(name)})`], { cwd: root, stdio: 'ignore' });
    return true;
  } catch {
    return false;
  }
}

checkNode();
if (!isInstalled()) {
  console.log('Installing packages (a few minutes the first time: sqlite3 may be compiled) …');
  const tools = missingTools();
  const done = install();
  if (!done || !loads('sqlite3')) {
    if (tools.length > 0) stop(`sqlite3 must be compiled here, and ${tools.join(', ')} ${tools.length > 1 ? 'are' : 'is'} missing: install them (on Debian: apt-get install -y python3 make g++) and run the command again.`);
    stop(done ? 'sqlite3 was installed but does not load: remove node_modules and run the command again.' : 'npm ci failed; its own words stand above.');
  }
  writeFileSync(stampFile, lockHash());
}
