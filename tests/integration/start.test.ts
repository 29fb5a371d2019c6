import { type ChildProcess, spawn } from 'node:child_process';
import {
  chmodSync,
  chownSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { createServer } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { isAlive } from '@/cli/local/lock.mjs';
import { ROOT } from '@/cli/local/places';
import { freePort } from '@/cli/local/ports';

/**
 * A clone of its own in a temporary folder: the real command, the real cluster, the real server. Only packages and the
 * build are lent to it, so that the test takes seconds.
 */
let clone: string;
let children: ChildProcess[] = [];

beforeAll(() => {
  clone = mkdtempSync(path.join(os.tmpdir(), 'nineover-clone-'));
  // As a clone usually is: PostgreSQL's user may look into it.
  chmodSync(clone, 0o755);
  for (const name of [
    'src',
    'drizzle',
    'public',
    'package.json',
    'package-lock.json',
    'tsconfig.json',
    'astro.config.mjs',
  ])
    cpSync(path.join(ROOT, name), path.join(clone, name), { recursive: true });
  symlinkSync(path.join(ROOT, 'node_modules'), path.join(clone, 'node_modules'));
  const build = inject('ground').build;
  mkdirSync(path.join(clone, '.local'), { recursive: true });
  cpSync(build, path.join(clone, '.local', 'builds', path.basename(build)), { recursive: true });
});

afterAll(async () => {
  for (const child of children) child.kill('SIGTERM');
  for (
    let tries = 0;
    tries < 100 && children.some(({ exitCode, signalCode }) => exitCode === null && signalCode === null);
    tries += 1
  )
    await sleep(100);
  // Whatever went wrong above, no PostgreSQL of the clone is left behind; and nothing else is ever ended.
  const file = path.join(clone, '.local', 'postgres', 'data', 'postmaster.pid');
  const pid = existsSync(file) ? postgresPid() : 0;
  const isOurs =
    pid > 0 && existsSync(`/proc/${pid}/cmdline`) && readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(clone);
  if (isOurs) process.kill(pid, 'SIGINT');
  for (let tries = 0; isOurs && tries < 50 && existsSync(file); tries += 1) await sleep(100);
  rmSync(clone, { recursive: true, force: true });
});

interface Start {
  readonly child: ChildProcess;
  readonly output: () => string;
  /** Waits for a text in the output, or for the end; answers with the seconds it took. */
  readonly until: (text: string) => Promise<number>;
  readonly end: () => Promise<number | null>;
}

function start(port: number): Start {
  const began = performance.now();
  const { DATABASE_URL: _, ...environment } = process.env;
  const child = spawn(process.execPath, ['--import', 'tsx', path.join('src', 'cli', 'start.ts')], {
    cwd: clone,
    env: { ...environment, PORT: String(port), NODE_ENV: 'production' },
  });
  children = [...children, child];
  let output = '';
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (part) => {
      output += part;
    });
  const end = async (): Promise<number | null> => {
    for (let tries = 0; tries < 300 && child.exitCode === null && child.signalCode === null; tries += 1)
      await sleep(100);
    return child.exitCode;
  };
  const until = async (text: string): Promise<number> => {
    for (let tries = 0; tries < 2400 && !output.includes(text); tries += 1) {
      if (child.exitCode !== null) throw new Error(`It ended before “${text}”:\n${output}`);
      await sleep(50);
    }
    if (!output.includes(text)) throw new Error(`No “${text}” in two minutes:\n${output}`);
    return (performance.now() - began) / 1000;
  };
  return { child, output: () => output, until, end };
}

const serverPid = (): number =>
  (JSON.parse(readFileSync(path.join(clone, '.local', 'start.json'), 'utf8')) as { server: number }).server;
const postgresPid = (): number =>
  Number(readFileSync(path.join(clone, '.local', 'postgres', 'data', 'postmaster.pid'), 'utf8').split('\n')[0]);

describe('npm start', () => {
  it('serves, refuses a second start, stops whole, survives a kill, and is quick when nothing changed', async () => {
    const port = await freePort();
    const first = start(port);
    await first.until('Ctrl-C stops it.');
    expect(first.output()).toContain(`http://127.0.0.1:${port}`);
    expect(first.output()).toContain('tester@');
    expect(await (await fetch(`http://127.0.0.1:${port}/api/v1/health`)).json()).toEqual({
      status: 'ok',
      database: 'ok',
    });

    const second = start(await freePort());
    expect(await second.end()).toBe(1);
    expect(second.output()).toContain('is running already');

    // The plug pulled: server and database go on without their command, and the next start takes over.
    const [server, database] = [serverPid(), postgresPid()];
    first.child.kill('SIGKILL');
    await first.end();
    expect([isAlive(server), isAlive(database)]).toEqual([true, true]);
    const third = start(port);
    const seconds = await third.until('Ctrl-C stops it.');
    expect(seconds).toBeLessThan(10);
    expect(isAlive(server)).toBe(false);
    expect(third.output()).not.toContain('Building');

    const [server3, database3] = [serverPid(), postgresPid()];
    third.child.kill('SIGINT');
    expect(await third.end()).toBe(0);
    // A process that has ended stays listed until its parent has noticed.
    for (let tries = 0; tries < 50 && (isAlive(server3) || isAlive(database3)); tries += 1) await sleep(100);
    expect([isAlive(server3), isAlive(database3)]).toEqual([false, false]);
  }, 300_000);

  it('says in one line that the port is busy', async () => {
    const port = await freePort();
    const other = createServer().listen(port, '127.0.0.1');
    const refused = start(port);
    expect(await refused.end()).toBe(1);
    expect(refused.output().trim().split('\n')).toHaveLength(1);
    expect(refused.output()).toContain(`Port ${port} of 127.0.0.1 is busy`);
    other.close();
  });

  it('takes no notice of a stale pid file that names a stranger', async () => {
    const data = path.join(clone, '.local', 'postgres', 'data');
    const file = path.join(data, 'postmaster.pid');
    writeFileSync(file, `${process.pid}\n${data}\n`);
    const { uid, gid } = statSync(data);
    if (process.getuid?.() === 0) chownSync(file, uid, gid);
    const port = await freePort();
    const again = start(port);
    await again.until('Ctrl-C stops it.');
    again.child.kill('SIGTERM');
    expect(await again.end()).toBe(0);
    expect(isAlive(process.pid)).toBe(true);
  }, 180_000);
});
