import { mkdirSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { ensureBuild } from '@/cli/local/build';
import { ensureDatabase, prepareFolder, startCluster } from '@/cli/local/cluster';
import { ensureChromium, ensurePostgres } from '@/cli/local/debian';
import { isAlive } from '@/cli/local/lock.mjs';
import { MIGRATIONS } from '@/cli/local/places';
import { migrateDatabase } from '@/lib/server/db/migrate';

/** What every worker needs to make databases and servers of its own. */
export interface TestGround {
  /** Connection strings to a database of the throw-away cluster; NAME stands for the database. */
  readonly superUrl: string;
  readonly ownerUrl: string;
  readonly appUrl: string;
  readonly build: string;
  /** Folder where workers note the servers they start, one file a process id. */
  readonly servers: string;
}

declare module 'vitest' {
  interface ProvidedContext {
    ground: TestGround;
  }
}

export const TEMPLATE = 'nineover_template';

interface Shared {
  ground: Promise<{ ground: TestGround; end: () => void }>;
  users: number;
}
/** The integration and the browser tests of one command share one cluster, though each is a project of its own. */
const place = globalThis as typeof globalThis & { nineoverGround?: Shared };

async function prepare(): Promise<{ ground: TestGround; end: () => void }> {
  const bin = await ensurePostgres();
  const folder = mkdtempSync(path.join(os.tmpdir(), 'nineover-test-'));
  if (!prepareFolder(folder)) throw new Error(`PostgreSQL’s user cannot reach ${folder}.`);
  const cluster = await startCluster({ bin, folder, durable: false });
  const servers = path.join(folder, 'servers');
  mkdirSync(servers);
  let ended = false;
  const end = (): void => {
    if (ended) return;
    ended = true;
    // A worker that was killed could not stop its servers.
    for (const pid of readdirSync(servers).map(Number)) if (isAlive(pid)) process.kill(pid, 'SIGKILL');
    cluster.stop();
    rmSync(folder, { recursive: true, force: true });
  };
  // Also when the command is broken off: no cluster may be left behind.
  process.once('exit', end);
  await ensureDatabase(cluster, TEMPLATE);
  await migrateDatabase(cluster.url('owner', TEMPLATE), MIGRATIONS);
  const build = await ensureBuild();
  const ground = {
    superUrl: cluster.url('super', 'NAME'),
    ownerUrl: cluster.url('owner', 'NAME'),
    appUrl: cluster.url('app', 'NAME'),
    build,
    servers,
  };
  return { ground, end };
}

export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  if (project.name === 'e2e') await ensureChromium();
  place.nineoverGround ??= { ground: prepare(), users: 0 };
  const shared = place.nineoverGround;
  shared.users += 1;
  const { ground, end } = await shared.ground;
  project.provide('ground', ground);
  return async () => {
    shared.users -= 1;
    if (shared.users === 0) {
      delete place.nineoverGround;
      end();
    }
  };
}
