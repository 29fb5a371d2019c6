import { and, asc, desc, eq, getTableColumns, lt, sql } from 'drizzle-orm';
import type { Layout } from '@/lib/mechanism/layout';
import type { Operation, Reading, Step } from '@/lib/mechanism/steps';
import { layoutFields } from '@/lib/schemas/layout';
import {
  MOST_LISTED,
  type RunEntry,
  type RunList,
  type RunMoment,
  type RunShown,
  type RunSummary,
} from '@/lib/schemas/run-shapes';
import type { Tx } from '../db/client';
import { machine, machineLayout } from '../db/schema/machines';
import { person } from '../db/schema/people';
import { reading, run, runFile, runStep } from '../db/schema/runs';
import { notFound } from '../http';
import type { Insider } from './insider';
import { idFrom, storedLayout } from './machine-hold';

type RunRow = typeof run.$inferSelect;
type StepRow = typeof runStep.$inferSelect & { readonly instant: string | null };
type ReadingRow = typeof reading.$inferSelect;

export interface RunQuery {
  readonly machine?: string | undefined;
  /** Id of the run after which the list goes on: the `next` of the answer before. */
  readonly before?: string | undefined;
  readonly limit?: number | undefined;
}

const runWithNames = { run, machine: machine.name, tester: person.name };

function summarised(row: { run: RunRow; machine: string; tester: string }): RunSummary {
  const { id, number, title, source, startedAt, finishedAt, turns, steps, readings, disagreeing, firstFault } = row.run;
  return {
    id,
    number,
    title,
    source,
    turns,
    steps,
    readings,
    disagreeing,
    machine: { id: row.run.machineId, name: row.machine },
    tester: { id: row.run.testerId, name: row.tester },
    startedAt: startedAt.toISOString(),
    finishedAt: finishedAt?.toISOString() ?? null,
    firstFault: firstFault ?? null,
  };
}

/** The number of a run; 404 where the workshop has none with this id. */
async function numberOf(tx: Tx, { workshop }: Insider, id: string): Promise<number> {
  const [row] = await tx
    .select({ number: run.number })
    .from(run)
    .where(and(eq(run.workshopId, workshop.id), eq(run.id, idFrom(id))));
  if (!row) throw notFound();
  return row.number;
}

/** The latest runs of the workshop, or of one machine, by their numbers. */
export async function listRuns(tx: Tx, who: Insider, query: RunQuery = {}): Promise<RunList> {
  const { machine: machineId, limit = MOST_LISTED } = query;
  const before = query.before === undefined ? undefined : await numberOf(tx, who, query.before);
  const rows = await tx
    .select(runWithNames)
    .from(run)
    .innerJoin(machine, and(eq(machine.workshopId, run.workshopId), eq(machine.id, run.machineId)))
    .innerJoin(person, eq(person.id, run.testerId))
    .where(
      and(
        eq(run.workshopId, who.workshop.id),
        machineId === undefined ? undefined : eq(run.machineId, idFrom(machineId)),
        before === undefined ? undefined : lt(run.number, before),
      ),
    )
    .orderBy(desc(run.number))
    .limit(limit + 1);
  const shown = rows.slice(0, limit);
  return { runs: shown.map(summarised), next: rows.length > limit ? (shown.at(-1)?.run.id ?? null) : null };
}

/** One run in a line. */
export async function runSummary(tx: Tx, { workshop }: Insider, id: string | undefined): Promise<RunSummary> {
  const [row] = await tx
    .select(runWithNames)
    .from(run)
    .innerJoin(machine, and(eq(machine.workshopId, run.workshopId), eq(machine.id, run.machineId)))
    .innerJoin(person, eq(person.id, run.testerId))
    .where(and(eq(run.workshopId, workshop.id), eq(run.id, idFrom(id))));
  if (!row) throw notFound();
  return summarised(row);
}

/** The operation that a row keeps in columns. */
function storedOperation(row: StepRow): Operation {
  switch (row.do) {
    case 'set':
      return { do: 'set', slides: row.slides ?? '' };
    case 'turn':
      return { do: 'turn', way: row.way ?? 'add', times: row.times ?? 1 };
    case 'shift':
      return { do: 'shift', to: row.carriage ?? 1 };
    case 'reverse':
      return { do: 'reverse', on: row.reversed ?? false };
    case 'clear':
      return { do: 'clear', what: row.clear ?? 'both' };
  }
}

export function storedReading(row: Pick<ReadingRow, 'result' | 'counter'>): Reading {
  return {
    ...(row.result === null ? {} : { result: row.result }),
    ...(row.counter === null ? {} : { counter: row.counter }),
  };
}

function storedMoment(row: StepRow): RunMoment | null {
  return row.instant !== null && row.atOffset !== null ? { instant: row.instant, offsetMinutes: row.atOffset } : null;
}

/** Readings of a step from the first to the one that stands: each replaces the one before. */
function chainOf(readings: readonly ReadingRow[]): ReadingRow[] {
  const next = new Map(readings.map((row) => [row.replaces, row]));
  const chain: ReadingRow[] = [];
  for (let row = next.get(null); row; row = next.get(row.id)) chain.push(row);
  return chain;
}

type Names = ReadonlyMap<string, string>;

function shownEntry(row: StepRow, readings: readonly ReadingRow[], names: Names): RunEntry {
  const chain = chainOf(readings);
  const standing = chain.at(-1);
  const who = (id: string | null): string => names.get(id ?? '') ?? '';
  const step: Step = { ...storedOperation(row), ...(standing ? { read: storedReading(standing) } : {}) };
  return {
    seq: row.seq,
    id: row.id,
    step,
    note: row.note,
    at: storedMoment(row),
    by: who(row.recordedBy),
    readingId: standing?.id ?? null,
    corrections: chain.slice(1).map((later, index) => ({
      was: storedReading(chain[index] ?? later),
      who: who(later.recordedBy),
      when: later.recordedAt.toISOString(),
      why: later.reason ?? '',
    })),
    withdrawn: row.withdrawnAt
      ? { who: who(row.withdrawnBy), when: row.withdrawnAt.toISOString(), why: row.withdrawnReason ?? '' }
      : null,
  };
}

/**
 * When a step was done, spelled by the database: the driver hands its texts to the platform's date parser, which takes
 * the years below 100 for others.
 */
const instantText = sql<string | null>`to_char(${runStep.at} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`;

/** Steps of a run in their order with all that became of them: three queries, however long the run is. */
export async function entriesOf(tx: Tx, workshopId: string, runId: string): Promise<RunEntry[]> {
  const steps = await tx
    .select({ ...getTableColumns(runStep), instant: instantText.as('instant') })
    .from(runStep)
    .where(and(eq(runStep.workshopId, workshopId), eq(runStep.runId, runId)))
    .orderBy(asc(runStep.seq));
  const readings = await tx
    .select()
    .from(reading)
    .where(and(eq(reading.workshopId, workshopId), eq(reading.runId, runId)))
    .orderBy(asc(reading.seq));
  const people = await tx.select({ id: person.id, name: person.name }).from(person);
  const names = new Map(people.map(({ id, name }) => [id, name]));
  const bySeq = new Map<number, ReadingRow[]>();
  for (const row of readings) {
    const known = bySeq.get(row.seq);
    if (known) known.push(row);
    else bySeq.set(row.seq, [row]);
  }
  return steps.map((row) => shownEntry(row, bySeq.get(row.seq) ?? [], names));
}

/** What a run is judged with. */
export interface RunGround {
  readonly row: RunRow;
  readonly layout: Layout;
}

/** A run and the layout it was logged on; locked against other changes where it is to be changed. */
export async function groundOf(
  tx: Tx,
  { workshop }: Insider,
  id: string | undefined,
  lock: boolean,
): Promise<RunGround> {
  const where = and(eq(run.workshopId, workshop.id), eq(run.id, idFrom(id)));
  const found = tx.select().from(run).where(where);
  const [row] = lock ? await found.for('update') : await found;
  if (!row) throw notFound();
  const [layout] = await tx
    .select()
    .from(machineLayout)
    .where(
      and(
        eq(machineLayout.workshopId, workshop.id),
        eq(machineLayout.machineId, row.machineId),
        eq(machineLayout.revision, row.layoutRevision),
      ),
    );
  if (!layout) throw new Error(`Run ${row.id} has no layout.`);
  return { row, layout: storedLayout(layout) };
}

/** A whole run; 404 where the workshop has none with this id. */
export async function getRun(tx: Tx, who: Insider, id: string | undefined): Promise<RunShown> {
  const { row, layout } = await groundOf(tx, who, id, false);
  const [file] = await tx
    .select({ name: runFile.name })
    .from(runFile)
    .where(and(eq(runFile.workshopId, who.workshop.id), eq(runFile.runId, row.id)));
  return {
    ...(await runSummary(tx, who, row.id)),
    note: row.note,
    zone: row.zone,
    layout: layoutFields(layout),
    layoutRevision: row.layoutRevision,
    start: {
      ...(row.startResult === null ? {} : { result: row.startResult }),
      ...(row.startCounter === null ? {} : { counter: row.startCounter }),
    },
    excluded: row.excluded,
    file: file ?? null,
    entries: await entriesOf(tx, who.workshop.id, row.id),
  };
}
