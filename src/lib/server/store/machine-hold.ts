import { and, eq } from 'drizzle-orm';
import { validate } from 'uuid';
import { acceptLayout, type Layout } from '@/lib/mechanism/layout';
import { layoutFields } from '@/lib/schemas/layout';
import type { Tx } from '../db/client';
import { machine, machineLayout } from '../db/schema/machines';
import { notFound } from '../http';
import type { Insider } from './insider';

type LayoutRow = typeof machineLayout.$inferSelect;

/** A stored layout through the core's door; the tables hold none that it would refuse. */
export function storedLayout(row: LayoutRow): Layout {
  const accepted = acceptLayout(layoutFields(row));
  if (!accepted.ok) throw new Error(`Stored layout ${row.machineId} revision ${row.revision} is not acceptable.`);
  return accepted.value;
}

/** Ids from addresses are any text; what is no id is nothing that exists. */
export function idFrom(text: string | undefined): string {
  if (text === undefined || !validate(text)) throw notFound();
  return text;
}

/** A machine and its current layout, held still until the transaction ends. */
export interface HeldMachine {
  readonly id: string;
  readonly name: string;
  readonly version: number;
  readonly revision: number;
  readonly layout: Layout;
}

/**
 * Locks a machine and gives its current layout: `share` for what builds on the layout (a run, an exclusion), `update`
 * for what changes it. Either waits for the other, so that no run begins on a layout that is just being changed.
 */
export async function holdMachine(
  tx: Tx,
  { workshop }: Insider,
  id: string | undefined,
  strength: 'share' | 'update',
): Promise<HeldMachine> {
  const machineId = idFrom(id);
  const [held] = await tx
    .select({
      id: machine.id,
      name: machine.name,
      version: machine.version,
      revision: machine.layoutRevision,
    })
    .from(machine)
    .where(and(eq(machine.workshopId, workshop.id), eq(machine.id, machineId)))
    .for(strength);
  if (!held) throw notFound();
  return {
    ...held,
    layout: await layoutAt(tx, workshop.id, machineId, held.revision),
  };
}

/** The layout that a machine had at a revision. */
export async function layoutAt(tx: Tx, workshop: string, machineId: string, revision: number): Promise<Layout> {
  const [row] = await tx
    .select()
    .from(machineLayout)
    .where(
      and(
        eq(machineLayout.workshopId, workshop),
        eq(machineLayout.machineId, machineId),
        eq(machineLayout.revision, revision),
      ),
    );
  if (!row) throw new Error(`Machine ${machineId} has no layout of revision ${revision}.`);
  return storedLayout(row);
}
