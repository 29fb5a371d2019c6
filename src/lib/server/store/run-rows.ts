import { v7 } from 'uuid';
import { type Operation, REGISTERS, type Reading, type Step } from '@/lib/mechanism/steps';
import type { NewEntry, RunMoment } from '@/lib/schemas/run-shapes';
import type { Tx } from '../db/client';
import { reading, runStep } from '../db/schema/runs';

/** Rows of one insert; PostgreSQL takes 65,535 values in a statement. */
const AT_ONCE = 1000;

function columnsOf(operation: Operation) {
  switch (operation.do) {
    case 'set':
      return { do: operation.do, slides: operation.slides };
    case 'turn':
      return { do: operation.do, way: operation.way, times: operation.times ?? 1 };
    case 'shift':
      return { do: operation.do, carriage: operation.to };
    case 'reverse':
      return { do: operation.do, reversed: operation.on };
    case 'clear':
      return { do: operation.do, clear: operation.what };
  }
}

function momentColumns(at: RunMoment | null | undefined) {
  return at ? { at: new Date(at.instant), atOffset: at.offsetMinutes } : {};
}

/**
 * An accepted reading as its columns hold it; null where nothing was read at all. A machine without a counter shows
 * nothing there, so that an empty text is no reading of it.
 */
export function readingColumns(read: Reading | undefined): { result: string | null; counter: string | null } | null {
  const [result = null, counter = null] = REGISTERS.map((register) => read?.[register] || null);
  return result === null && counter === null ? null : { result, counter };
}

/** An accepted step on its way into the table. */
export interface RowToAdd extends Omit<NewEntry, 'step'> {
  readonly step: Step;
}

export interface Whose {
  readonly workshopId: string;
  readonly runId: string;
  readonly recordedBy: string;
}

/** Adds steps with their readings, numbered from `seq` on. */
export async function insertSteps(tx: Tx, whose: Whose, seq: number, added: readonly RowToAdd[]): Promise<void> {
  for (let from = 0; from < added.length; from += AT_ONCE) {
    const part = added.slice(from, from + AT_ONCE);
    await tx.insert(runStep).values(
      part.map(({ id, step, note, at }, index) => ({
        ...whose,
        seq: seq + from + index,
        id,
        note: note ?? '',
        ...columnsOf(step),
        ...momentColumns(at),
      })),
    );
    const readings = part.flatMap(({ step }, index) => {
      const read = readingColumns(step.read);
      return read ? [{ ...whose, id: v7(), seq: seq + from + index, ...read }] : [];
    });
    if (readings.length > 0) await tx.insert(reading).values(readings);
  }
}
