import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { wheelsIn } from '@/lib/mechanism/accept';
import type { ExclusionShown, NewExclusion } from '@/lib/schemas/machine-shapes';
import type { Tx } from '../db/client';
import { exclusion } from '../db/schema/machines';
import { person } from '../db/schema/people';
import type { RunExclusion } from '../db/schema/runs';
import { uniqueViolation } from '../db/violations';
import { notFound, Refusal, refuseInput } from '../http';
import type { Insider } from './insider';
import { holdMachine, idFrom } from './machine-hold';

/** Every exclusion of a machine: open ones first, from the lowest wheel, then the ended ones, latest first. */
export async function exclusionsOf(tx: Tx, { workshop }: Insider, machineId: string): Promise<ExclusionShown[]> {
  const ender = alias(person, 'ender');
  const rows = await tx
    .select({ exclusion, by: person.name, endedBy: ender.name })
    .from(exclusion)
    .innerJoin(person, eq(person.id, exclusion.createdBy))
    .leftJoin(ender, eq(ender.id, exclusion.endedBy))
    .where(and(eq(exclusion.workshopId, workshop.id), eq(exclusion.machineId, machineId)))
    .orderBy(
      sql`${exclusion.endedAt} desc nulls first`,
      sql`${exclusion.register} desc`,
      asc(exclusion.wheel),
      asc(exclusion.id),
    );
  return rows.map(({ exclusion: row, by, endedBy }) => ({
    id: row.id,
    register: row.register,
    wheel: row.wheel,
    reason: row.reason,
    since: row.since,
    by,
    endedAt: row.endedAt?.toISOString() ?? null,
    endedBy,
  }));
}

/** What is left out now, for a run that begins. */
export function openExclusions(tx: Tx, { workshop }: Insider, machineId: string): Promise<RunExclusion[]> {
  return tx
    .select({
      register: exclusion.register,
      wheel: exclusion.wheel,
      reason: exclusion.reason,
    })
    .from(exclusion)
    .where(and(eq(exclusion.workshopId, workshop.id), eq(exclusion.machineId, machineId), isNull(exclusion.endedAt)))
    .orderBy(sql`${exclusion.register} desc`, asc(exclusion.wheel));
}

/**
 * Leaves a wheel of the current layout out of the judgement. `today` is the workshop's date: an exclusion tells what is
 * so, not what is planned.
 */
export async function addExclusion(
  tx: Tx,
  who: Insider,
  machineId: string | undefined,
  added: NewExclusion,
  today: string,
): Promise<string> {
  const held = await holdMachine(tx, who, machineId, 'share');
  const { register, wheel, reason, since = today } = added;
  const most = wheelsIn(held.layout, register);
  if (wheel > most)
    refuseInput([
      {
        pointer: '/wheel',
        detail: most === 0 ? 'This machine has no counter.' : `Give a wheel from 1 to ${most}.`,
      },
    ]);
  if (since > today)
    refuseInput([
      {
        pointer: '/since',
        detail: `Give today (${today}) or an earlier day; an exclusion is not planned ahead.`,
      },
    ]);
  try {
    const [row] = await tx
      .insert(exclusion)
      .values({
        workshopId: who.workshop.id,
        machineId: held.id,
        register,
        wheel,
        reason,
        since,
        createdBy: who.person.id,
      })
      .returning({ id: exclusion.id });
    if (!row) throw new Error('An insert gave no row.');
    return row.id;
  } catch (error) {
    if (uniqueViolation(error) !== 'exclusion_open') throw error;
    const detail = `Wheel ${wheel} of the ${register} ${register === 'result' ? 'register ' : ''}is excluded already; end that exclusion first.`;
    throw new Refusal(409, { detail, errors: [{ pointer: '/wheel', detail }] });
  }
}

/** Ends an exclusion: the wheel counts again from now on. 409 when it has ended already. */
export async function endExclusion(
  tx: Tx,
  who: Insider,
  machineId: string | undefined,
  id: string | undefined,
): Promise<void> {
  const place = and(
    eq(exclusion.workshopId, who.workshop.id),
    eq(exclusion.machineId, idFrom(machineId)),
    eq(exclusion.id, idFrom(id)),
  );
  const ended = await tx
    .update(exclusion)
    .set({ endedAt: new Date(), endedBy: who.person.id })
    .where(and(place, isNull(exclusion.endedAt)))
    .returning({ id: exclusion.id });
  if (ended.length > 0) return;
  const [there] = await tx.select({ id: exclusion.id }).from(exclusion).where(place);
  if (!there) throw notFound();
  throw new Refusal(409, { detail: 'This exclusion has ended already.' });
}
