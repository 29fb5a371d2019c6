import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ensureChromium, ensurePostgres, Missing } from './local/debian';
import { ROOT } from './local/places';

/** Counts of one part; a check without cases counts as one. */
interface Outcome {
  readonly passed: number;
  readonly failed: number;
  readonly skipped: number;
}

const PROJECTS = ['unit', 'integration', 'e2e'] as const;
type Project = (typeof PROJECTS)[number];
const CHECKS = {
  check: ['astro', 'check'],
  lint: ['biome', 'check', '--config-path=.biome.json', '--error-on-warnings', '.'],
  direction: ['depcruise', '--config', '.ci/dependency-cruiser.cjs', 'src'],
} as const;
type Check = keyof typeof CHECKS;
const PARTS = [...(Object.keys(CHECKS) as Check[]), ...PROJECTS];

/** Runs a program of the packages; its output is shown whole when it ends, so that two at once do not mix. */
function run(title: string, args: readonly string[]): Promise<number> {
  return new Promise((resolve) => {
    const began = performance.now();
    const [program = '', ...rest] = args;
    const child = spawn(path.join(ROOT, 'node_modules', '.bin', program), rest, {
      cwd: ROOT,
      stdio: ['ignore', 'pipe', 'pipe'],
      env: { ...process.env, ASTRO_TELEMETRY_DISABLED: '1' },
    });
    running.add(child);
    let output = '';
    const keep = (part: Buffer): void => {
      output += part.toString();
    };
    child.stdout.on('data', keep);
    child.stderr.on('data', keep);
    child.on('close', (code) => {
      running.delete(child);
      const seconds = ((performance.now() - began) / 1000).toFixed(1);
      console.log(`\n── ${title}: ${code === 0 ? 'passed' : 'FAILED'} in ${seconds} s`);
      if (output.trim()) console.log(output.trimEnd());
      resolve(code ?? 1);
    });
  });
}

const running = new Set<ReturnType<typeof spawn>>();

async function runCheck(name: Check): Promise<Outcome> {
  const code = await run(name, CHECKS[name]);
  return { passed: code === 0 ? 1 : 0, failed: code === 0 ? 0 : 1, skipped: 0 };
}

interface VitestReport {
  readonly numPassedTests: number;
  readonly numFailedTests: number;
  readonly numPendingTests: number;
  readonly numTodoTests: number;
  readonly success: boolean;
}

/** Runs projects of the test suite; a suite that breaks outside its tests counts as one failure more. */
async function runTests(projects: readonly Project[]): Promise<Outcome> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'nineover-report-'));
  const file = path.join(folder, 'report.json');
  try {
    const code = await run(projects.join(', '), [
      'vitest',
      'run',
      '--config',
      'tests/vitest.config.ts',
      ...projects.flatMap((name) => ['--project', name]),
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${file}`,
    ]);
    const report = JSON.parse(readFileSync(file, 'utf8')) as VitestReport;
    const broken = code !== 0 && report.numFailedTests === 0 ? 1 : 0;
    return {
      passed: report.numPassedTests,
      failed: report.numFailedTests + broken,
      skipped: report.numPendingTests + report.numTodoTests,
    };
  } catch {
    return { passed: 0, failed: 1, skipped: 0 };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function inOrder<T>(items: readonly T[], work: (item: T) => Promise<Outcome>): Promise<Outcome[]> {
  const outcomes: Outcome[] = [];
  for (const item of items) outcomes.push(await work(item));
  return outcomes;
}

async function main(chosen: readonly string[]): Promise<number> {
  const unknown = chosen.filter((part) => !(PARTS as string[]).includes(part));
  if (unknown.length > 0) throw new Missing(`No such part: ${unknown.join(', ')}. There are: ${PARTS.join(', ')}.`);
  const wanted = (part: string): boolean => chosen.length === 0 || chosen.includes(part);
  const projects = PROJECTS.filter(wanted);
  if (wanted('integration') || wanted('e2e')) await ensurePostgres();
  if (wanted('e2e')) await ensureChromium();
  const checks = (Object.keys(CHECKS) as Check[]).filter(wanted);
  // Two cores: the checks, one after the other, beside the unit tests; then the tests that need servers.
  const quick = projects.filter((name) => name === 'unit');
  const slow = projects.filter((name) => name !== 'unit');
  const first = await Promise.all([inOrder(checks, runCheck), inOrder(quick, (name) => runTests([name]))]);
  const last = slow.length > 0 ? [await runTests(slow)] : [];
  const all = [...first.flat(), ...last];
  const total = (field: keyof Outcome): number => all.reduce((sum, outcome) => sum + outcome[field], 0);
  if (total('skipped') > 0) console.log(`\n${total('skipped')} skipped`);
  console.log(`\n${total('passed')} passed, ${total('failed')} failed`);
  return total('failed') === 0 && total('passed') > 0 ? 0 : 1;
}

for (const signal of ['SIGINT', 'SIGTERM'] as const)
  process.on(signal, () => {
    for (const child of running) child.kill(signal);
  });

main(process.argv.slice(2)).then(
  (code) => process.exit(code),
  (error: unknown) => {
    console.error(error instanceof Missing ? error.message : error);
    console.log('\n0 passed, 1 failed');
    process.exit(1);
  },
);
