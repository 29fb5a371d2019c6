import { existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { migrateDatabase } from '@/lib/server/db/migrate';
import { type Cluster, ensureDatabase, prepareFolder, startCluster } from './cluster';
import { ensurePostgres } from './debian';
import { isAlive, locked } from './lock.mjs';
import { CLONE, LOCAL, MIGRATIONS } from './places';

const DATABASE = 'nineover';
const HOLDERS = path.join(LOCAL, 'cluster-holders');

/** The database that a command works on, and the end of its use. */
export interface WorkingDatabase {
  /** What the application connects to. */
  readonly url: string;
  readonly release: () => void;
}

/** Where the cluster lies: in the clone, or, where PostgreSQL's user cannot reach that, beside other clusters. */
function clusterFolder(): string {
  const inside = path.join(LOCAL, 'postgres');
  if (prepareFolder(inside)) return inside;
  const outside = `/var/lib/nineover/${CLONE}`;
  if (!prepareFolder(outside)) throw new Error(`PostgreSQL’s user can reach neither ${inside} nor ${outside}.`);
  if (!existsSync(path.join(outside, 'data')))
    console.log(`PostgreSQL’s user cannot reach ${inside}; the cluster is kept in ${outside}.`);
  return outside;
}

function otherHolders(): boolean {
  const pids = readdirSync(HOLDERS).map(Number);
  for (const pid of pids) if (!isAlive(pid)) rmSync(path.join(HOLDERS, String(pid)), { force: true });
  return pids.some((pid) => pid !== process.pid && isAlive(pid));
}

/** Several commands may share the clone's cluster; the last one to leave stops it. */
function hold(cluster: Cluster): () => void {
  const mine = path.join(HOLDERS, String(process.pid));
  writeFileSync(mine, '');
  let released = false;
  return () => {
    if (released) return;
    released = true;
    rmSync(mine, { force: true });
    if (!otherHolders()) cluster.stop();
  };
}

/** The database of the settings, or the clone's own cluster; migrated either way. */
export async function openDatabase(environment: Record<string, string | undefined>): Promise<WorkingDatabase> {
  const given = environment.DATABASE_URL;
  if (given) {
    await migrateDatabase(environment.DATABASE_OWNER_URL ?? given, MIGRATIONS);
    return { url: given, release: () => {} };
  }
  const bin = await ensurePostgres();
  mkdirSync(HOLDERS, { recursive: true });
  return locked(path.join(LOCAL, 'cluster.lock'), async () => {
    const cluster = await startCluster({ bin, folder: clusterFolder(), durable: true });
    const release = hold(cluster);
    try {
      await ensureDatabase(cluster, DATABASE);
      await migrateDatabase(cluster.url('owner', DATABASE), MIGRATIONS);
    } catch (error) {
      release();
      throw error;
    }
    return { url: cluster.url('app', DATABASE), release };
  });
}
