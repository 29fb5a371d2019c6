import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { locked } from './lock.mjs';

export const IS_ROOT = process.getuid?.() === 0;

/** A line for people, then the end: something of the machine is missing that we may not install. */
export class Missing extends Error {}

/** Installs a Debian package as root, or says how; `present` is asked before and after. */
export async function ensurePackage(name: string, present: () => boolean): Promise<void> {
  if (present()) return;
  if (!IS_ROOT || !existsSync('/usr/bin/apt-get'))
    throw new Missing(`${name} is missing. Install it (on Debian: sudo apt-get install ${name}) and try again.`);
  await locked('/tmp/nineover-apt.lock', () => {
    if (present()) return;
    console.log(`Installing Debian's ${name} …`);
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
    spawnSync('apt-get', ['update', '-qq'], { stdio: ['ignore', 'ignore', 'inherit'], env });
    spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', name], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env,
    });
  });
  if (!present()) throw new Missing(`${name} could not be installed; see above.`);
}

/** Folder of the newest PostgreSQL's programs, or null. */
function postgresPrograms(): string | null {
  const base = '/usr/lib/postgresql';
  if (!existsSync(base)) return null;
  const versions = readdirSync(base).sort((a, b) => Number(b) - Number(a));
  const found = versions.map((version) => path.join(base, version, 'bin'));
  return found.find((bin) => existsSync(path.join(bin, 'initdb')) && existsSync(path.join(bin, 'pg_ctl'))) ?? null;
}

/** Where PostgreSQL's programs are, installing them if we may. */
export async function ensurePostgres(): Promise<string> {
  // Debian would make and start a cluster of its own on port 5432; we neither need nor want it.
  const hadNone = postgresPrograms() === null;
  await ensurePackage('postgresql', () => postgresPrograms() !== null);
  const bin = postgresPrograms();
  if (!bin) throw new Missing('PostgreSQL is missing.');
  if (hadNone && existsSync('/usr/bin/pg_ctlcluster')) {
    const version = bin.split('/').at(-2) ?? '';
    spawnSync('pg_ctlcluster', [version, 'main', 'stop'], { stdio: 'ignore' });
  }
  return bin;
}

export const CHROMIUM = '/usr/bin/chromium';

export async function ensureChromium(): Promise<void> {
  await ensurePackage('chromium', () => existsSync(CHROMIUM));
}
