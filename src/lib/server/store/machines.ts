import { and, asc, count, desc, eq, isNull, sql } from 'drizzle-orm';
import { layoutFields } from '@/lib/schemas/layout';
import type { LayoutRevision, MachineShown, MachineSummary, RunResult } from '@/lib/schemas/machine-shapes';
import type { Tx } from '../db/client';
import { exclusion, machine, machineLayout } from '../db/schema/machines';
import { person } from '../db/schema/people';
import { run } from '../db/schema/runs';
import { notFound } from '../http';
import { exclusionsOf } from './exclusions';
import type { Insider } from './insider';
import { idFrom } from './machine-hold';

/** Runs that a machine's page shows. */
const LATEST_RUNS = 10;

const runResult = {
  id: run.id,
  number: run.number,
  title: run.title,
  startedAt: run.startedAt,
  finishedAt: run.finishedAt,
  turns: run.turns,
  readings: run.readings,
  disagreeing: run.disagreeing,
  firstFault: run.firstFault,
};
type RunRow = { [K in keyof typeof runResult]: (typeof run.$inferSelect)[K] };

function shownRun(row: RunRow): RunResult {
  return {
    ...row,
    startedAt: row.startedAt.toISOString(),
    finishedAt: row.finishedAt?.toISOString() ?? null,
    firstFault: row.firstFault ?? null,
  };
}

/** Machines with what their lists show, by name; one machine when `id` is given. */
async function summaries(tx: Tx, { workshop }: Insider, id?: string): Promise<MachineSummary[]> {
  const ofMachine = id === undefined ? undefined : eq(machine.id, id);
  const totals = tx
    .select({
      machineId: run.machineId,
      turns: sql<string>`sum(${run.turns})`.as('total_turns'),
      runs: count().as('total_runs'),
    })
    .from(run)
    .where(and(eq(run.workshopId, workshop.id), id === undefined ? undefined : eq(run.machineId, id)))
    .groupBy(run.machineId)
    .as('totals');
  const open = tx
    .select({ machineId: exclusion.machineId, open: count().as('open') })
    .from(exclusion)
    .where(and(eq(exclusion.workshopId, workshop.id), isNull(exclusion.endedAt)))
    .groupBy(exclusion.machineId)
    .as('open_exclusions');
  const rows = await tx
    .select({
      machine,
      layout: machineLayout,
      turns: totals.turns,
      runs: totals.runs,
      open: open.open,
    })
    .from(machine)
    .innerJoin(
      machineLayout,
      and(
        eq(machineLayout.workshopId, machine.workshopId),
        eq(machineLayout.machineId, machine.id),
        eq(machineLayout.revision, machine.layoutRevision),
      ),
    )
    .leftJoin(totals, eq(totals.machineId, machine.id))
    .leftJoin(open, eq(open.machineId, machine.id))
    .where(and(eq(machine.workshopId, workshop.id), ofMachine))
    .orderBy(asc(sql`lower(${machine.name})`));
  const last = await lastRuns(tx, workshop.id, id);
  return rows.map((row) => ({
    id: row.machine.id,
    name: row.machine.name,
    serial: row.machine.serial,
    scale: row.machine.scale,
    state: row.machine.state,
    odometer: row.machine.turnsBefore + Number(row.turns ?? 0),
    layoutRevision: row.machine.layoutRevision,
    layout: layoutFields(row.layout),
    openExclusions: row.open ?? 0,
    runs: row.runs ?? 0,
    lastRun: last.get(row.machine.id) ?? null,
    version: row.machine.version,
  }));
}

async function lastRuns(tx: Tx, workshop: string, id?: string): Promise<Map<string, RunResult>> {
  const rows = await tx
    .selectDistinctOn([run.machineId], {
      machineId: run.machineId,
      ...runResult,
    })
    .from(run)
    .where(and(eq(run.workshopId, workshop), id === undefined ? undefined : eq(run.machineId, id)))
    .orderBy(run.machineId, desc(run.startedAt), desc(run.number));
  return new Map(rows.map(({ machineId, ...row }) => [machineId, shownRun(row)]));
}

/** Every machine of the workshop, by name. */
export function listMachines(tx: Tx, who: Insider): Promise<MachineSummary[]> {
  return summaries(tx, who);
}

/** Names and layouts for choosing a machine, by name. */
export async function machineNames(tx: Tx, { workshop }: Insider): Promise<{ id: string; name: string }[]> {
  return tx
    .select({ id: machine.id, name: machine.name })
    .from(machine)
    .where(eq(machine.workshopId, workshop.id))
    .orderBy(asc(sql`lower(${machine.name})`));
}

/** The entity tag of a machine: its version, as `If-Match` takes it. */
export function versionTag({ version }: Pick<MachineSummary, 'version'>): string {
  return `"${version}"`;
}

async function revisionsOf(tx: Tx, workshop: string, machineId: string): Promise<LayoutRevision[]> {
  const used = tx
    .select({ revision: run.layoutRevision, runs: count().as('runs') })
    .from(run)
    .where(and(eq(run.workshopId, workshop), eq(run.machineId, machineId)))
    .groupBy(run.layoutRevision)
    .as('used');
  const rows = await tx
    .select({ layout: machineLayout, by: person.name, runs: used.runs })
    .from(machineLayout)
    .innerJoin(person, eq(person.id, machineLayout.createdBy))
    .leftJoin(used, eq(used.revision, machineLayout.revision))
    .where(and(eq(machineLayout.workshopId, workshop), eq(machineLayout.machineId, machineId)))
    .orderBy(desc(machineLayout.revision));
  return rows.map(({ layout, by, runs }) => ({
    revision: layout.revision,
    layout: layoutFields(layout),
    createdAt: layout.createdAt.toISOString(),
    by,
    runs: runs ?? 0,
  }));
}

/** One machine with all that its page shows; 404 where the workshop has none with this id. */
export async function getMachine(tx: Tx, who: Insider, id: string | undefined): Promise<MachineShown> {
  const machineId = idFrom(id);
  const [summary] = await summaries(tx, who, machineId);
  const workshop = who.workshop.id;
  const [row] = await tx
    .select()
    .from(machine)
    .where(and(eq(machine.workshopId, workshop), eq(machine.id, machineId)));
  if (!summary || !row) throw notFound();
  const latest = await tx
    .select(runResult)
    .from(run)
    .where(and(eq(run.workshopId, workshop), eq(run.machineId, machineId)))
    .orderBy(desc(run.startedAt), desc(run.number))
    .limit(LATEST_RUNS);
  return {
    ...summary,
    turnsBefore: row.turnsBefore,
    note: row.note,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    revisions: await revisionsOf(tx, workshop, machineId),
    exclusions: await exclusionsOf(tx, who, machineId),
    latestRuns: latest.map(shownRun),
  };
}
