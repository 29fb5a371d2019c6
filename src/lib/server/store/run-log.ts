import { isDeepStrictEqual } from 'node:util';
import { and, desc, eq, inArray, isNull, max } from 'drizzle-orm';
import { v7 } from 'uuid';
import { acceptStart, acceptSteps, wheelsIn } from '@/lib/mechanism/accept';
import type { Layout } from '@/lib/mechanism/layout';
import { readGlyphs } from '@/lib/mechanism/registers';
import { REGISTERS, type Reading, type Step } from '@/lib/mechanism/steps';
import { LIMITS } from '@/lib/schemas/limits';
import type { Append, Correction, Logged, NewEntry, NewRun, RunChange, RunEntry } from '@/lib/schemas/run-shapes';
import type { RunSource } from '@/lib/schemas/runs';
import type { Tx } from '../db/client';
import { workshop } from '../db/schema/people';
import { reading, run, runStep } from '../db/schema/runs';
import { admitted } from '../doors';
import { notFound, Refusal } from '../http';
import { openExclusions } from './exclusions';
import type { Insider } from './insider';
import { holdMachine } from './machine-hold';
import { insertSteps, type RowToAdd } from './run-rows';
import { rewriteTallies } from './run-tallies';
import { entriesOf, groundOf, type RunGround, runSummary } from './runs';

type Remark = Logged['remarks'][number];

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
    startResult: start.result ?? null,
    startCounter: start.counter ?? null,
    excluded: await openExclusions(tx, who, held.id),
    ...(made.startedAt ? { startedAt: made.startedAt } : {}),
  });
  return id;
}

const finished = (): Refusal =>
  new Refusal(409, { detail: 'This run is finished; nothing can be added to it. Begin a new one.' });

/** Zeros that were filled in on the left, to be told: a reading is never changed in silence. */
function filledRemarks(layout: Layout, seq: number, read: Reading | undefined): Remark[] {
  return REGISTERS.flatMap((register) => {
    const text = read?.[register];
    const glyphs = text === undefined ? null : readGlyphs(text, wheelsIn(layout, register));
    if (!glyphs?.ok || glyphs.value.filled === 0) return [];
    const { filled } = glyphs.value;
    return [{ seq, register, what: `${filled} ${filled === 1 ? 'zero was' : 'zeros were'} filled in on the left.` }];
  });
}

/** Steps through the core's door: canonical glyphs, full width. */
function acceptedEntries(layout: Layout, entries: readonly NewEntry[]): RowToAdd[] {
  const steps = entries.map(({ step }) => step);
  const result = acceptSteps(layout, steps, ['entries']);
  // The door speaks of a list of steps; in this body each stands one level deeper.
  const accepted = admitted(
    result.ok
      ? result
      : {
          ok: false,
          problems: result.problems.map((problem) => {
            const [list, index, ...rest] = problem.path;
            return {
              ...problem,
              path: index === undefined ? problem.path : [list ?? 'entries', index, 'step', ...rest],
            };
          }),
        },
  );
  return entries.map((entry, index) => ({ ...entry, step: accepted[index] as Step }));
}

async function nextSeq(tx: Tx, { row }: RunGround): Promise<number> {
  const [last] = await tx
    .select({ seq: max(runStep.seq) })
    .from(runStep)
    .where(and(eq(runStep.workshopId, row.workshopId), eq(runStep.runId, row.id)));
  return (last?.seq ?? 0) + 1;
}

/** Whether what is sent under a known id is what is stored under it. */
function isSame(layout: Layout, sent: NewEntry, stored: RunEntry): boolean {
  const accepted = acceptSteps(layout, [sent.step]);
  // A correction may have come since; then the first reading is what was sent.
  const first = stored.corrections[0]?.was ?? stored.step.read;
  const plain = ({ read: _, ...operation }: Step): unknown => operation;
  return (
    accepted.ok &&
    accepted.value[0] !== undefined &&
    isDeepStrictEqual(plain(accepted.value[0]), plain(stored.step)) &&
    isDeepStrictEqual({ ...accepted.value[0].read }, { ...first }) &&
    (sent.note ?? '') === stored.note
  );
}

/** Which of these steps are stored already. 409 where an id stands for something else. */
async function alreadyStored(tx: Tx, { row, layout }: RunGround, sent: Append): Promise<Set<string>> {
  const ids = sent.entries.map(({ id }) => id);
  const known = await tx
    .select({ id: runStep.id, runId: runStep.runId })
    .from(runStep)
    .where(and(eq(runStep.workshopId, row.workshopId), inArray(runStep.id, ids)));
  if (known.some(({ runId }) => runId !== row.id))
    throw new Refusal(409, { detail: 'A step with this id belongs to another run.' });
  if (known.length === 0) return new Set();
  const stored = new Map((await entriesOf(tx, row.workshopId, row.id)).map((entry) => [entry.id, entry]));
  for (const entry of sent.entries) {
    const there = stored.get(entry.id);
    if (there && !isSame(layout, entry, there))
      throw new Refusal(409, { detail: `Another step is stored under the id of this one, as step ${there.seq}.` });
  }
  return new Set(known.map(({ id }) => id));
}

/**
 * Adds steps to a run. What is stored already is answered as stored, so that sending twice stores once; a different
 * step at the expected number is a 409 that tells who logged it.
 */
export async function appendSteps(tx: Tx, who: Insider, id: string | undefined, sent: Append): Promise<Logged> {
  const ground = await groundOf(tx, who, id, true);
  const { row, layout } = ground;
  const known = await alreadyStored(tx, ground, sent);
  const fresh = sent.entries.filter((entry) => !known.has(entry.id));
  const remarks: Remark[] = [];
  if (fresh.length > 0) {
    if (row.finishedAt) throw finished();
    const seq = await nextSeq(tx, ground);
    const expected = sent.seq + sent.entries.indexOf(fresh[0] as NewEntry);
    if (seq !== expected) throw await taken(tx, ground, seq, expected);
    if (seq + fresh.length - 1 > LIMITS.runSteps)
      throw new Refusal(409, { detail: `A run takes ${LIMITS.runSteps} steps. Finish this one and begin another.` });
    const accepted = acceptedEntries(layout, fresh);
    fresh.forEach(({ step }, index) => {
      remarks.push(...filledRemarks(layout, seq + index, step.read));
    });
    await insertSteps(tx, { workshopId: row.workshopId, runId: row.id, recordedBy: who.person.id }, seq, accepted);
  }
  return logged(tx, who, ground, remarks, (entry) => sent.entries.some(({ id: one }) => one === entry.id));
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

/** Judges the run anew, keeps its tallies, and answers with the steps concerned. */
async function logged(
  tx: Tx,
  who: Insider,
  ground: RunGround,
  remarks: Remark[],
  concerns: (entry: RunEntry) => boolean,
): Promise<Logged> {
  const entries = await entriesOf(tx, ground.row.workshopId, ground.row.id);
  await rewriteTallies(tx, ground, entries);
  return { run: await runSummary(tx, who, ground.row.id), entries: entries.filter(concerns), remarks };
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
    .select({ seq: runStep.seq })
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
  return logged(tx, who, ground, [], (entry) => entry.seq === seq);
}

/** Puts a reading right, or adds one where there was none; what stood there before stays in sight. */
export async function correctReading(tx: Tx, who: Insider, id: string | undefined, sent: Correction): Promise<Logged> {
  const ground = await groundOf(tx, who, id, true);
  const { row, layout } = ground;
  const entry = (await entriesOf(tx, row.workshopId, row.id)).find(({ seq }) => seq === sent.seq);
  if (!entry || entry.withdrawn) throw notFound('There is no such step, or it has been taken back.');
  if (sent.replaces !== undefined && sent.replaces !== entry.readingId)
    throw new Refusal(409, { detail: 'This reading has been corrected by somebody else meanwhile. Look at it again.' });
  if (entry.readingId && !sent.reason)
    throw new Refusal(400, {
      detail: 'Some fields are not as expected.',
      errors: [{ pointer: '/reason', detail: 'Say why; both readings stay with the run.' }],
    });
  const { read: _, ...operation } = entry.step;
  const [accepted] = admitted(acceptSteps(layout, [{ ...operation, read: sent.reading }], ['reading']));
  await tx.insert(reading).values({
    workshopId: row.workshopId,
    id: v7(),
    runId: row.id,
    seq: sent.seq,
    result: accepted?.read?.result,
    counter: accepted?.read?.counter,
    recordedBy: who.person.id,
    replaces: entry.readingId,
    reason: entry.readingId ? sent.reason : null,
  });
  return logged(tx, who, ground, filledRemarks(layout, sent.seq, sent.reading), ({ seq }) => seq === sent.seq);
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
