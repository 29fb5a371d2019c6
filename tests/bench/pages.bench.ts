import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { Visitor } from '@tests/helpers/visitor';
import { ensureBuild } from '@/cli/local/build';
import { ensureDatabase, prepareFolder, startCluster } from '@/cli/local/cluster';
import { ensurePostgres } from '@/cli/local/debian';
import { MIGRATIONS } from '@/cli/local/places';
import { freePort } from '@/cli/local/ports';
import { startServer } from '@/cli/local/server';
import { seedDemo } from '@/cli/seed/demo';
import { closeDatabase } from '@/lib/server/db/client';
import { migrateDatabase } from '@/lib/server/db/migrate';
import { configure } from '@/lib/server/settings';

export interface PageFigure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly atMost?: number;
}

/** Kilobytes of script, gzipped, that a page with a ladder may load. */
const LADDER_LIMIT = 130;

/** Every module that a script of the build loads by static import, itself included. */
function moduleGraph(client: string, entry: string, seen = new Set<string>()): Set<string> {
  if (seen.has(entry)) return seen;
  const file = path.join(client, entry);
  if (!existsSync(file)) throw new Error(`The page names a script that is not in the build: ${entry}`);
  seen.add(entry);
  const text = readFileSync(file, 'utf8');
  for (const [, from = ''] of text.matchAll(/(?:^|[;}\s])(?:import|export)[^"'();]*?["'](\.{1,2}\/[^"']+\.js)["']/g))
    moduleGraph(client, path.posix.join(path.posix.dirname(entry), from), seen);
  return seen;
}

/** Gzipped bytes of all script a page sends: what stands in it, and every module that it will load. */
function scriptBytes(html: string, client: string): number {
  const inline = [...html.matchAll(/<script(?![^>]*\ssrc=)[^>]*>([\s\S]*?)<\/script>/g)]
    .map(([, text = '']) => text)
    .join('\n');
  const named = [...html.matchAll(/(?:src|component-url|renderer-url|href)="(\/_astro\/[^"]+\.js)"/g)].map(
    ([, url = '']) => url,
  );
  const modules = new Set<string>();
  for (const url of named) moduleGraph(client, url, modules);
  const loaded = [...modules].map((module) => gzipSync(readFileSync(path.join(client, module))).length);
  return (inline ? gzipSync(inline).length : 0) + loaded.reduce((sum, bytes) => sum + bytes, 0);
}

/** Measures the script of every kind of page, on the built site with the demo in it. */
export async function benchPages(): Promise<PageFigure[]> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'nineover-bench-'));
  prepareFolder(folder);
  const cluster = await startCluster({ bin: await ensurePostgres(), folder, durable: false });
  try {
    await ensureDatabase(cluster, 'nineover');
    await migrateDatabase(cluster.url('owner', 'nineover'), MIGRATIONS);
    const databaseUrl = cluster.url('app', 'nineover');
    const authSecret = 'a secret for measuring pages, long enough';
    configure({ DATABASE_URL: databaseUrl, AUTH_SECRET: authSecret });
    const lead = (await seedDemo()).find(({ role }) => role === 'lead');
    await closeDatabase();
    if (!lead) throw new Error('The demo has a lead.');
    const build = await ensureBuild();
    const port = await freePort();
    const server = await startServer({ build, host: '127.0.0.1', port, databaseUrl, authSecret, output: 'collect' });
    try {
      return await measure(new Visitor(server.url), lead, path.join(build, 'client'));
    } finally {
      await server.stop();
    }
  } finally {
    cluster.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

async function measure(
  visitor: Visitor,
  lead: { email: string; password: string },
  client: string,
): Promise<PageFigure[]> {
  const figure = async (name: string, address: string, atMost?: number): Promise<PageFigure> => {
    const response = await visitor.get(address);
    if (!response.ok) throw new Error(`${address} answers ${response.status}.`);
    const value = scriptBytes(await response.text(), client) / 1000;
    return { name: `script of ${name}`, value, unit: 'kB', ...(atMost === undefined ? {} : { atMost }) };
  };
  const figures = [
    await figure('the start page, with its ladder', '/', LADDER_LIMIT),
    await figure('signing in, no island', '/sign-in', 0),
    await figure('making a workshop, no island', '/sign-up', 0),
  ];
  await visitor.signIn(lead.email, lead.password);
  const first = async (address: string): Promise<string> => {
    const body = (await (await visitor.get(address)).json()) as Record<string, { id: string }[]>;
    return Object.values(body)[0]?.[0]?.id ?? '';
  };
  const [machine, run] = [await first('/api/v1/machines'), await first('/api/v1/runs')];
  return [
    ...figures,
    await figure('people, no island', '/people', 0),
    await figure('the account, no island', '/account', 0),
    await figure('a machine, no island', `/machines/${machine}`, 0),
    await figure('beginning a run, no island', '/runs/new', 0),
    await figure('a run, with its ladder', `/runs/${run}`, LADDER_LIMIT),
    await figure('the list of machines', '/machines'),
    await figure('the list of runs', '/runs'),
    await figure('importing a run', '/runs/import'),
  ];
}
