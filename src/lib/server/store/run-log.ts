import { and, desc, eq, inArray, isNull, max } from 'drizzle-orm';
import { v7 } from 'uuid';
import { acceptStart } from '@/lib/mechanism/accept';
import { LIMITS } from '@/lib/schemas/limits';
import type { Append, Logged, NewRun, RunChange } from '@/lib/schemas/run-shapes';
import type { RunSource } from '@/lib/schemas/runs';
import type { Tx } from '../db/client';
import { workshop } from '../db/schema/people';
import { run, runStep } from '../db/schema/runs';
import { admitted } from '../doors';
import { notFound, Refusal } from '../http';
import { openExclusions } from './exclusions';
import type { Insider } from './insider';
import { holdMachine } from './machine-hold';
import { acceptedEntries, isSame } from './run-doors';
import { logged } from './run-judged';
import { insertSteps, type RowToAdd } from './run-rows';
import { entriesOf, groundOf, type RunGround } from './runs';

/** Begins a run on the machine's layout and exclusions as they are now; answers with its id. */
export async function startRun(
  tx: Tx,
  who: Insider,
  made: Omit<NewRun, 'source'> & { readonly source?: RunSource | undefined; readonly startedAt?: Date | undefined },
): Promise<string> {
  const held = await holdMachine(tx, who, made.machine, 'share');
  const start = admitted(acceptStart(held.layout, made.start));
  const workshopId = who.workshop.id;
  // Numbers count up without a gap: two runs begun at the same moment come one after the other.
  const [home] = await tx
    .select({ zone: workshop.zone })
    .from(workshop)
    .where(eq(workshop.id, workshopId))
    .for('update');
  const [latest] = await tx
    .select({ number: max(run.number) })
    .from(run)
    .where(eq(run.workshopId, workshopId));
  const id = v7();
  await tx.insert(run).values({
    workshopId,
    id,
    number: (latest?.number ?? 0) + 1,
    machineId: held.id,
    layoutRevision: held.revision,
    title: made.title ?? '',
    note: made.note ?? '',
    source: made.source ?? 'hand',
    testerId: who.person.id,
    zone: made.zone ?? home?.zone ?? 'UTC',
    startResult: start.result || null,
    startCounter: start.counter || null,
    excluded: await openExclusions(tx, who, held.id),
    ...(made.startedAt ? { startedAt: made.startedAt } : {}),
  });
  return id;
}

const finished = (): Refusal =>
  new Refusal(409, { detail: 'This run is finished; nothing can be added to it. Begin a new one.' });

async function nextSeq(tx: Tx, { row }: RunGround): Promise<number> {
  const [last] = await tx
    .select({ seq: max(runStep.seq) })
    .from(runStep)
    .where(and(eq(runStep.workshopId, row.workshopId), eq(runStep.runId, row.id)));
  return (last?.seq ?? 0) + 1;
}

/** Which of these steps are stored already. 409 where an id stands for something else. */
async function alreadyStored(tx: Tx, { row }: RunGround, sent: readonly RowToAdd[]): Promise<Set<string>> {
  const ids = sent.map(({ id }) => id);
  const known = await tx
    .select({ id: runStep.id, runId: runStep.runId })
    .from(runStep)
    .where(and(eq(runStep.workshopId, row.workshopId), inArray(runStep.id, ids)));
  if (known.some(({ runId }) => runId !== row.id))
    throw new Refusal(409, { detail: 'A step with this id belongs to another run.' });
  if (known.length === 0) return new Set();
  const stored = new Map((await entriesOf(tx, row.workshopId, row.id)).map((entry) => [entry.id, entry]));
  for (const entry of sent) {
    const there = stored.get(entry.id);
    if (there && !isSame(entry, there))
      throw new Refusal(409, { detail: `Another step is stored under the id of this one, as step ${there.seq}.` });
  }
  return new Set(known.map(({ id }) => id));
}

async function addFresh(tx: Tx, who: Insider, ground: RunGround, from: number, fresh: RowToAdd[]): Promise<void> {
  const { row } = ground;
  if (row.finishedAt) throw finished();
  const seq = await nextSeq(tx, ground);
  if (seq !== from) throw await taken(tx, ground, seq, from);
  if (seq + fresh.length - 1 > LIMITS.runSteps)
    throw new Refusal(409, { detail: `A run takes ${LIMITS.runSteps} steps. Finish this one and begin another.` });
  await insertSteps(tx, { workshopId: row.workshopId, runId: row.id, recordedBy: who.person.id }, seq, fresh);
}

/**
 * Adds steps to a run. What is stored already is answered as stored, so that sending twice stores once; a different
 * step at the expected number is a 409 that tells who logged it.
 */
export async function appendSteps(tx: Tx, who: Insider, id: string | undefined, sent: Append): Promise<Logged> {
  const ground = await groundOf(tx, who, id, true);
  const accepted = acceptedEntries(ground.layout, sent.entries);
  const known = await alreadyStored(tx, ground, accepted);
  const first = accepted.findIndex((entry) => !known.has(entry.id));
  const fresh = accepted.filter((entry) => !known.has(entry.id));
  if (fresh.length > 0) await addFresh(tx, who, ground, sent.seq + first, fresh);
  return logged(tx, who, ground, new Map(sent.entries.map(({ id: one, step }) => [one, step.read])));
}

async function taken(tx: Tx, ground: RunGround, next: number, expected: number): Promise<Refusal> {
  if (next < expected)
    return new Refusal(409, { detail: `Step ${next} is still missing here; send the steps in their order.` });
  const standing = (await entriesOf(tx, ground.row.workshopId, ground.row.id)).find(({ seq }) => seq === expected);
  const by = standing ? ` by ${standing.by}` : '';
  return new Refusal(409, {
    detail: `Step ${expected} has been logged already${by}, from another browser or tab. The run stands at step ${next - 1}.`,
  });
}

/** Takes the last standing step back: it stays in sight, marked, and is not judged. */
export async function takeBack(
  tx: Tx,
  who: Insider,
  id: string | undefined,
  seq: number,
  reason: string,
): Promise<Logged> {
  const ground = await groundOf(tx, who, id, true);
  const { row } = ground;
  if (row.finishedAt) throw finished();
  const ofRun = and(eq(runStep.workshopId, row.workshopId), eq(runStep.runId, row.id));
  const [last] = await tx
    .select({ id: runStep.id, seq: runStep.seq })
    .from(runStep)
    .where(and(ofRun, isNull(runStep.withdrawnAt)))
    .orderBy(desc(runStep.seq))
    .limit(1);
  if (!last || seq > last.seq) throw notFound('There is no such step, or it has been taken back.');
  if (last.seq !== seq)
    throw new Refusal(409, { detail: `Only the last step can be taken back; that is step ${last.seq}.` });
  await tx
    .update(runStep)
    .set({ withdrawnAt: new Date(), withdrawnBy: who.person.id, withdrawnReason: reason })
    .where(and(ofRun, eq(runStep.seq, seq)));
  return logged(tx, who, ground, new Map([[last.id, undefined]]));
}

/** Ends a run; nothing more is added to it, readings can still be put right. Ending it again changes nothing. */
export async function finishRun(tx: Tx, who: Insider, id: string | undefined, at = new Date()): Promise<void> {
  const ground = await groundOf(tx, who, id, true);
  const { row } = ground;
  if (row.finishedAt) return;
  if ((await nextSeq(tx, ground)) === 1)
    throw new Refusal(409, { detail: 'Nothing has been logged in this run. Delete it instead.' });
  await tx
    .update(run)
    .set({ finishedAt: at, finishedBy: who.person.id })
    .where(and(eq(run.workshopId, row.workshopId), eq(run.id, row.id)));
}

export async function editRun(tx: Tx, who: Insider, id: string | undefined, change: RunChange): Promise<void> {
  const { row } = await groundOf(tx, who, id, true);
  const fields = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined));
  if (Object.keys(fields).length === 0) return;
  await tx
    .update(run)
    .set(fields)
    .where(and(eq(run.workshopId, row.workshopId), eq(run.id, row.id)));
}

/** Deletes a run that has no step at all, not even one taken back: what was logged stays. */
export async function deleteRun(tx: Tx, who: Insider, id: string | undefined): Promise<void> {
  const ground = await groundOf(tx, who, id, true);
  const { row } = ground;
  if ((await nextSeq(tx, ground)) > 1)
    throw new Refusal(409, { detail: 'Only an empty run can be deleted; this one has steps. Finish it instead.' });
  await tx.delete(run).where(and(eq(run.workshopId, row.workshopId), eq(run.id, row.id)));
}
