import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  utimesSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import { isAlive, locked } from './lock.mjs';
import { LOCAL, ROOT } from './places';

const BUILDS = path.join(LOCAL, 'builds');
const HOLDERS = path.join(LOCAL, 'build-holders');
/** Builds that no command has used for this long are let go; a server that runs longer holds its own. */
const KEPT_HOURS = 24;
const SOURCES = ['src', 'public', 'astro.config.mjs', 'package-lock.json', 'tsconfig.json'];

function filesUnder(place: string): string[] {
  if (!statSync(place).isDirectory()) return [place];
  return readdirSync(place)
    .sort()
    .flatMap((name) => filesUnder(path.join(place, name)));
}

/** What the built site depends on; commands and tests are not part of it. */
function sourcesHash(): string {
  const hash = createHash('sha256').update(process.env.ALLOWED_HOSTS ?? '');
  const files = SOURCES.map((name) => path.join(ROOT, name))
    .filter(existsSync)
    .flatMap(filesUnder)
    .filter((file) => !file.startsWith(path.join(ROOT, 'src', 'cli')) && !file.includes('.test.'));
  for (const file of files) hash.update(path.relative(ROOT, file)).update('\0').update(readFileSync(file)).update('\0');
  return hash.digest('hex').slice(0, 16);
}

function runBuild(outDir: string): Promise<string | null> {
  return new Promise((resolve) => {
    let output = '';
    const astro = path.join(ROOT, 'node_modules', 'astro', 'astro.js');
    const child = spawn(process.execPath, [astro, 'build', '--outDir', outDir], {
      cwd: ROOT,
      stdio: ['ignore', 'pipe', 'pipe'],
      env: { ...process.env, NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1' },
    });
    child.stdout.on('data', (part) => {
      output += part;
    });
    child.stderr.on('data', (part) => {
      output += part;
    });
    child.on('exit', (code) => resolve(code === 0 ? null : output));
  });
}

/** Builds that running servers serve from: pages are loaded from there when they are first asked for. */
function buildsInUse(): Set<string> {
  const holders = existsSync(HOLDERS) ? readdirSync(HOLDERS) : [];
  const alive = holders.filter((pid) => isAlive(Number(pid)));
  for (const pid of holders.filter((one) => !alive.includes(one))) rmSync(path.join(HOLDERS, pid), { force: true });
  return new Set(alive.map((pid) => readFileSync(path.join(HOLDERS, pid), 'utf8')));
}

/** Notes that the server with this process id serves from a build, until it has ended. */
export function holdBuild(folder: string, server: number): void {
  mkdirSync(HOLDERS, { recursive: true });
  writeFileSync(path.join(HOLDERS, String(server)), folder);
}

function pruneBuilds(): void {
  const inUse = buildsInUse();
  const oldest = Date.now() - KEPT_HOURS * 60 * 60 * 1000;
  for (const name of readdirSync(BUILDS)) {
    const build = path.join(BUILDS, name);
    if (!inUse.has(build) && statSync(build).mtimeMs < oldest) rmSync(build, { recursive: true, force: true });
  }
}

/**
 * The site built from the sources as they are now. Builds are kept by what they were made of, so that a running server
 * keeps its own files while another command builds newer ones.
 */
export async function ensureBuild(): Promise<string> {
  const folder = path.join(BUILDS, sourcesHash());
  mkdirSync(BUILDS, { recursive: true });
  if (!existsSync(folder))
    await locked(path.join(LOCAL, 'build.lock'), async () => {
      if (existsSync(folder)) return;
      console.log('Building the site …');
      const making = `${folder}.making`;
      rmSync(making, { recursive: true, force: true });
      const failed = await runBuild(making);
      if (failed !== null) throw new Error(`The build failed:\n${failed}`);
      renameSync(making, folder);
    });
  utimesSync(folder, new Date(), new Date());
  pruneBuilds();
  return folder;
}

export const serverEntry = (build: string): string => path.join(build, 'server', 'entry.mjs');
