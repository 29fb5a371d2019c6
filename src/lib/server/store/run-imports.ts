import { createHash } from 'node:crypto';
import { and, desc, eq } from 'drizzle-orm';
import { v7 } from 'uuid';
import { type RunFile, readRunCsv } from '@/lib/interchange/csv-read';
import { writeRunCsv } from '@/lib/interchange/csv-write';
import { decodeCsv } from '@/lib/interchange/decode';
import type { CheckedFile } from '@/lib/schemas/import-shapes';
import { LIMITS } from '@/lib/schemas/limits';
import { remarkInWords, wordsOf } from '@/lib/schemas/words';
import type { Tx } from '../db/client';
import { machine } from '../db/schema/machines';
import { run, runFile } from '../db/schema/runs';
import { notFound, Refusal } from '../http';
import type { Insider } from './insider';
import { type HeldMachine, holdMachine } from './machine-hold';
import { finishRun, startRun } from './run-log';
import { insertSteps } from './run-rows';
import { rewriteTallies } from './run-tallies';
import { entriesOf, groundOf } from './runs';

export interface GivenFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

const sha256Of = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

/** A machine may have been given the same file before; other machines' files are none of this one's business. */
async function earlierRun(tx: Tx, { workshop }: Insider, sha256: string): Promise<CheckedFile['already']> {
  const [row] = await tx
    .select({ runId: run.id, number: run.number, machine: machine.name })
    .from(runFile)
    .innerJoin(run, and(eq(run.workshopId, runFile.workshopId), eq(run.id, runFile.runId)))
    .innerJoin(machine, and(eq(machine.workshopId, run.workshopId), eq(machine.id, run.machineId)))
    .where(and(eq(runFile.workshopId, workshop.id), eq(runFile.sha256, sha256)))
    .orderBy(desc(run.number))
    .limit(1);
  return row ?? null;
}

const PLAIN = { delimiter: ',', newline: 'none', bom: false } as const;

function read(bytes: Uint8Array, held: HeldMachine): RunFile {
  const text = decodeCsv(bytes);
  if (text.ok) return readRunCsv(text.value, held.layout);
  return { dialect: PLAIN, remarks: [], rows: [], problems: text.problems };
}

function shown(file: RunFile): Pick<CheckedFile, 'dialect' | 'remarks' | 'rows' | 'problems'> {
  return {
    dialect: file.dialect,
    remarks: file.remarks.map((remark) => {
      const { place, what } = remarkInWords(remark);
      return place ? `${place}: ${what}` : what;
    }),
    rows: file.rows.map(({ line, step, understood, remarks }) => {
      const { at, note, ...plain } = step;
      return {
        line,
        understood,
        step: plain,
        note: note ?? '',
        at: at ? { instant: at.instant, offsetMinutes: at.offsetMinutes } : null,
        remarks: remarks.map((remark) => remarkInWords(remark).what),
      };
    }),
    problems: file.problems.map((problem) => {
      const { what, cure } = wordsOf(problem);
      return { line: problem.line || null, column: problem.column || null, what, cure };
    }),
  };
}

/** Everything in a file as it was understood for this machine, and everything wrong with it. Stores nothing. */
export async function checkFile(
  tx: Tx,
  who: Insider,
  machineId: string | undefined,
  given: GivenFile,
): Promise<CheckedFile> {
  const held = await holdMachine(tx, who, machineId, 'share');
  const sha256 = sha256Of(given.bytes);
  return { name: given.name, sha256, already: await earlierRun(tx, who, sha256), ...shown(read(given.bytes, held)) };
}

/** What a run from a file is called when nobody says: as the file, without its ending. */
function titleFrom(name: string): string {
  return [...name.replace(/\.[^.]*$/u, '')].slice(0, LIMITS.nameLength).join('').trim();
}

/**
 * When the run of a file began and ended: with its first and last step, if the file says so. A clock that ran ahead does
 * not put the run into the future.
 */
function sittingOf({ rows }: RunFile, now: Date): { startedAt: Date; finishedAt: Date } {
  const told = rows.flatMap(({ step }) => (step.at ? [step.at.instant] : [])).sort();
  const past = (instant = now.toISOString()): Date => (instant < now.toISOString() ? new Date(instant) : now);
  return { startedAt: past(told[0]), finishedAt: past(told.at(-1)) };
}

/**
 * Stores a checked file as a finished run, all of it or nothing. `sha256` is what the check answered, so that what is
 * stored is what was seen. Answers with the run's id.
 */
export async function storeFile(
  tx: Tx,
  who: Insider,
  machineId: string | undefined,
  given: GivenFile & { readonly sha256: string; readonly again: boolean; readonly title?: string | undefined },
): Promise<string> {
  // Held alone, so that a file confirmed twice at the same moment is stored once.
  const held = await holdMachine(tx, who, machineId, 'update');
  if (sha256Of(given.bytes) !== given.sha256)
    throw new Refusal(409, { detail: 'This is not the file that was checked. Check it again.' });
  const file = read(given.bytes, held);
  if (file.problems.length > 0 || file.rows.length === 0)
    throw new Refusal(400, { detail: 'The file has problems, or no row; nothing was stored. Check it again.' });
  const earlier = given.again ? null : await earlierRun(tx, who, given.sha256);
  if (earlier) throw new Refusal(409, { detail: `The same file was imported already, as run ${earlier.number}.` });
  const { startedAt, finishedAt } = sittingOf(file, new Date());
  const runId = await startRun(tx, who, {
    machine: held.id,
    title: given.title ?? titleFrom(given.name),
    source: 'file',
    startedAt,
  });
  const whose = { workshopId: who.workshop.id, runId, recordedBy: who.person.id };
  const rows = file.rows.map(({ step: { at, note, ...step } }) => ({ id: v7(), step, note, at }));
  await insertSteps(tx, whose, 1, rows);
  const { name, sha256, bytes } = given;
  await tx.insert(runFile).values({
    workshopId: who.workshop.id,
    runId,
    name,
    sha256,
    content: bytes,
    createdBy: who.person.id,
  });
  await rewriteTallies(tx, await groundOf(tx, who, runId, true), await entriesOf(tx, who.workshop.id, runId));
  await finishRun(tx, who, runId, finishedAt);
  return runId;
}

/** A run as CSV: the steps that stand, with the readings that stand. */
export async function exportRun(
  tx: Tx,
  who: Insider,
  id: string | undefined,
  guardFormulas: boolean,
): Promise<{ number: number; text: string }> {
  const { row } = await groundOf(tx, who, id, false);
  const entries = (await entriesOf(tx, who.workshop.id, row.id)).filter(({ withdrawn }) => !withdrawn);
  const steps = entries.map(({ step, note, at }) => ({ ...step, ...(note ? { note } : {}), ...(at ? { at } : {}) }));
  return { number: row.number, text: writeRunCsv(steps, { guardFormulas }) };
}

/** The file a run was imported from, byte for byte; 404 where it was logged by hand. */
export async function originalFile(tx: Tx, who: Insider, id: string | undefined): Promise<GivenFile> {
  const { row } = await groundOf(tx, who, id, false);
  const [file] = await tx
    .select({ name: runFile.name, bytes: runFile.content })
    .from(runFile)
    .where(and(eq(runFile.workshopId, who.workshop.id), eq(runFile.runId, row.id)));
  if (!file) throw notFound();
  return file;
}
