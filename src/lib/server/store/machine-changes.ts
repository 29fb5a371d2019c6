import { and, eq, isNull } from 'drizzle-orm';
import { wheelsIn } from '@/lib/mechanism/accept';
import { acceptLayout, type Layout } from '@/lib/mechanism/layout';
import { REGISTERS } from '@/lib/mechanism/steps';
import { layoutFields } from '@/lib/schemas/layout';
import type { MachineChange, NewMachine } from '@/lib/schemas/machine-shapes';
import type { Tx } from '../db/client';
import { exclusion, machine, machineLayout } from '../db/schema/machines';
import { run } from '../db/schema/runs';
import { uniqueViolation } from '../db/violations';
import { admitted } from '../doors';
import { Refusal, refuseInput } from '../http';
import type { Insider } from './insider';
import { type HeldMachine, holdMachine } from './machine-hold';

/** Turns a name that is taken into words; every other error stays what it is. */
async function withFreeName<T>(name: string | undefined, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (uniqueViolation(error) !== 'machine_name') throw error;
    const detail = `Another machine of the workshop is called “${name}”; choose another name.`;
    throw new Refusal(409, { detail, errors: [{ pointer: '/name', detail }] });
  }
}

/** Enters a machine with its first layout; answers with its id. 409 when the name is taken. */
export async function createMachine(tx: Tx, who: Insider, entered: NewMachine): Promise<string> {
  const { layout: described = {}, ...fields } = entered;
  const layout = admitted(acceptLayout(described), ['layout']);
  const workshopId = who.workshop.id;
  const createdBy = who.person.id;
  return withFreeName(entered.name, async () => {
    const [row] = await tx
      .insert(machine)
      .values({ workshopId, createdBy, ...fields })
      .returning({ id: machine.id });
    if (!row) throw new Error('An insert gave no row.');
    await tx.insert(machineLayout).values({
      workshopId,
      machineId: row.id,
      revision: 1,
      createdBy,
      ...layoutFields(layout),
    });
    return row.id;
  });
}

function sameLayout(one: Layout, other: Layout): boolean {
  return JSON.stringify(layoutFields(one)) === JSON.stringify(layoutFields(other));
}

/** An excluded wheel that the new layout does not have would be left out of nothing: it must be ended first. */
async function refuseLostExclusions(tx: Tx, who: Insider, held: HeldMachine, layout: Layout): Promise<void> {
  const open = await tx
    .select({ register: exclusion.register, wheel: exclusion.wheel })
    .from(exclusion)
    .where(and(eq(exclusion.workshopId, who.workshop.id), eq(exclusion.machineId, held.id), isNull(exclusion.endedAt)));
  const errors = REGISTERS.flatMap((register) => {
    const lost = open.filter((one) => one.register === register && one.wheel > wheelsIn(layout, register));
    const wheels = lost.map(({ wheel }) => wheel).sort((a, b) => a - b);
    return wheels.length === 0
      ? []
      : [
          {
            pointer: `/layout/${register}Wheels`,
            detail: `Wheel ${wheels.join(', ')} is excluded now and would be gone; end that exclusion first.`,
          },
        ];
  });
  if (errors.length > 0) refuseInput(errors);
}

/** Changes the layout: in place while no run refers to it, else as a new revision. Answers with the revision. */
async function changeLayout(tx: Tx, who: Insider, held: HeldMachine, layout: Layout): Promise<number> {
  if (sameLayout(held.layout, layout)) return held.revision;
  await refuseLostExclusions(tx, who, held, layout);
  const workshopId = who.workshop.id;
  const createdBy = who.person.id;
  const [used] = await tx
    .select({ id: run.id })
    .from(run)
    .where(and(eq(run.workshopId, workshopId), eq(run.machineId, held.id), eq(run.layoutRevision, held.revision)))
    .limit(1);
  if (used) {
    const revision = held.revision + 1;
    await tx.insert(machineLayout).values({
      workshopId,
      machineId: held.id,
      revision,
      createdBy,
      ...layoutFields(layout),
    });
    return revision;
  }
  await tx
    .update(machineLayout)
    .set({ ...layoutFields(layout), createdBy, createdAt: new Date() })
    .where(
      and(
        eq(machineLayout.workshopId, workshopId),
        eq(machineLayout.machineId, held.id),
        eq(machineLayout.revision, held.revision),
      ),
    );
  return held.revision;
}

/**
 * Changes a machine that was seen at `version`; answers with the new version. 409 when somebody has changed it since,
 * or when the name is taken.
 */
export async function updateMachine(
  tx: Tx,
  who: Insider,
  id: string | undefined,
  version: number,
  change: Omit<MachineChange, 'version'>,
): Promise<number> {
  const held = await holdMachine(tx, who, id, 'update');
  if (held.version !== version)
    throw new Refusal(409, {
      detail: `Somebody changed this machine after you opened it: you saw version ${version}, it is at version ${held.version} now. Open it again and make your change there.`,
    });
  const { layout: described, ...fields } = change;
  const layoutRevision = described
    ? await changeLayout(tx, who, held, admitted(acceptLayout(described), ['layout']))
    : held.revision;
  return withFreeName(change.name, async () => {
    await tx
      .update(machine)
      .set({
        ...fields,
        layoutRevision,
        version: held.version + 1,
        updatedAt: new Date(),
      })
      .where(and(eq(machine.workshopId, who.workshop.id), eq(machine.id, held.id)));
    return held.version + 1;
  });
}
