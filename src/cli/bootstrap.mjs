// What every npm script runs first: plain JavaScript, because on a fresh clone no package is there yet.
// It brings the packages to what the lock file says, then hands over to the command in TypeScript.
import { spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { locked } from './local/lock.mjs';

const COMMANDS = ['start', 'dev', 'test', 'bench', 'seed'];
const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const [command, ...args] = process.argv.slice(2);

function fail(/** @type {string} */ text) {
  console.error(text);
  process.exit(1);
}

if (!COMMANDS.includes(command ?? '')) fail(`Usage: node src/cli/bootstrap.mjs ${COMMANDS.join('|')}`);
const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19))
  fail(`Nineover needs Node 20.19 or newer; this is ${process.versions.node}.`);

const stamp = path.join(root, 'node_modules', '.nineover-lock');
const wanted = createHash('sha256')
  .update(readFileSync(path.join(root, 'package-lock.json')))
  .digest('hex');
const isInstalled = () => existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted;

if (!isInstalled()) {
  mkdirSync(path.join(root, '.local'), { recursive: true });
  await locked(
    path.join(root, '.local', 'install.lock'),
    () => {
      if (isInstalled()) return;
      console.log('Installing the packages of the lock file …');
      const { status } = spawnSync('npm', ['ci', '--no-fund', '--no-audit'], {
        cwd: root,
        stdio: 'inherit',
        // A production setting of the shell must not leave out what building and testing need.
        env: { ...process.env, NODE_ENV: 'development' },
      });
      if (status !== 0) fail('npm ci did not finish; see above.');
      writeFileSync(stamp, wanted);
    },
    () => console.log('Packages are being installed by another command; waiting …'),
  );
}

const child = spawn(process.execPath, ['--import', 'tsx', path.join('src', 'cli', `${command}.ts`), ...args], {
  cwd: root,
  stdio: 'inherit',
});
// A terminal sends Ctrl-C to both; a process manager only to this one. The child stops once either way.
for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']))
  process.on(signal, () => child.kill(signal));
child.on('exit', (code, signal) => process.exit(code ?? (signal === 'SIGINT' ? 130 : 1)));
