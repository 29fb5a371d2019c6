import { and, eq } from 'drizzle-orm';
import { compare } from '@/lib/comparison/compare';
import type { RunEntry } from '@/lib/schemas/run-shapes';
import type { Tx } from '../db/client';
import { run } from '../db/schema/runs';
import type { RunGround } from './runs';

interface Tallies {
  readonly steps: number;
  readonly turns: number;
  readonly readings: number;
  readonly disagreeing: number;
  readonly firstFault: { readonly register: 'result' | 'counter'; readonly wheel: number; readonly seq: number } | null;
}

/** What a run's lists show of it, by the same comparison as on its page, over the steps that stand. */
export function talliesOf({ row, layout }: RunGround, entries: readonly RunEntry[]): Tallies {
  const standing = entries.filter(({ withdrawn }) => !withdrawn);
  const steps = standing.map(({ step }) => step);
  const start = { result: row.startResult ?? undefined, counter: row.startCounter ?? undefined };
  const { readings, firstFault } = compare({ layout, start, steps, excluded: row.excluded });
  const isWrong = ({ verdict }: { verdict: string }): boolean => verdict === 'differs' || verdict === 'between';
  const seq = firstFault ? standing[firstFault.step]?.seq : undefined;
  return {
    steps: standing.length,
    turns: steps.reduce((sum, step) => sum + (step.do === 'turn' ? (step.times ?? 1) : 0), 0),
    readings: readings.length,
    disagreeing: readings.filter(({ result, counter }) => result.some(isWrong) || counter.some(isWrong)).length,
    firstFault:
      firstFault && seq !== undefined ? { register: firstFault.register, wheel: firstFault.wheel, seq } : null,
  };
}

/** Rewrites the tallies of a run that this transaction holds. */
export async function rewriteTallies(tx: Tx, ground: RunGround, entries: readonly RunEntry[]): Promise<void> {
  const { workshopId, id } = ground.row;
  await tx
    .update(run)
    .set(talliesOf(ground, entries))
    .where(and(eq(run.workshopId, workshopId), eq(run.id, id)));
}
