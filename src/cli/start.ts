import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { configure } from '@/lib/server/settings';
import { ensureBuild } from './local/build';
import { openDatabase } from './local/database';
import { Missing } from './local/debian';
import { keptSecret, readEnvironment } from './local/environment';
import { isAlive } from './local/lock.mjs';
import { LOCAL } from './local/places';
import { isFree } from './local/ports';
import { startServer } from './local/server';
import { accountLines, seedDemo } from './seed/demo';

const NOTE = path.join(LOCAL, 'start.json');

interface StartNote {
  readonly pid: number;
  readonly server: number;
  readonly url: string;
}

function commandLine(pid: number): string {
  const file = `/proc/${pid}/cmdline`;
  return existsSync(file) ? readFileSync(file, 'utf8').replaceAll('\0', ' ') : '';
}

/** Refuses a second start; ends the server that a killed one left behind, if it is provably ours. */
async function clearEarlierStart(): Promise<void> {
  if (!existsSync(NOTE)) return;
  const note = JSON.parse(readFileSync(NOTE, 'utf8')) as StartNote;
  if (isAlive(note.pid) && commandLine(note.pid).includes(path.join('src', 'cli', 'start.ts')))
    throw new Missing(`Nineover of this folder is running already: ${note.url}`);
  if (isAlive(note.server) && commandLine(note.server).includes(path.join(LOCAL, 'builds'))) {
    console.log('Ending the server that an earlier start left behind.');
    process.kill(note.server, 'SIGTERM');
    for (let tries = 0; tries < 50 && isAlive(note.server); tries += 1) await sleep(100);
    if (isAlive(note.server)) process.kill(note.server, 'SIGKILL');
  }
  rmSync(NOTE, { force: true });
}

async function main(): Promise<void> {
  const environment = readEnvironment();
  const host = environment.HOST ?? '127.0.0.1';
  const port = Number(environment.PORT ?? 4321);
  await clearEarlierStart();
  if (!(await isFree(port, host)))
    throw new Missing(
      `Port ${port} of ${host} is busy. Stop what listens there, or choose another: PORT=4322 npm start`,
    );
  const database = await openDatabase(environment);
  try {
    const authSecret = environment.AUTH_SECRET ?? keptSecret();
    configure({ ...environment, DATABASE_URL: database.url, AUTH_SECRET: authSecret });
    const accounts = await seedDemo();
    const build = await ensureBuild();
    const server = await startServer({
      build,
      host,
      port,
      databaseUrl: database.url,
      authSecret,
      environment,
      output: 'inherit',
    });
    writeFileSync(NOTE, JSON.stringify({ pid: process.pid, server: server.child.pid, url: server.url }));
    console.log(`\nNineover is at ${server.url}\n`);
    for (const line of accountLines(accounts)) console.log(line);
    console.log('\nCtrl-C stops it.');
    const ended = await new Promise<boolean>((resolve) => {
      for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, () => resolve(true));
      server.child.once('exit', () => resolve(false));
    });
    await server.stop();
    rmSync(NOTE, { force: true });
    if (!ended) throw new Missing('The server ended by itself; its last words are above.');
  } finally {
    database.release();
  }
}

main().then(
  () => process.exit(0),
  (error: unknown) => {
    console.error(error instanceof Missing ? error.message : error);
    process.exit(1);
  },
);
