import type { Reading } from '@/lib/mechanism/steps';
import type { Logged } from '@/lib/schemas/run-shapes';
import type { Tx } from '../db/client';
import type { Insider } from './insider';
import { filledRemarks } from './run-doors';
import { rewriteTallies } from './run-tallies';
import { entriesOf, type RunGround, runSummary } from './runs';

/**
 * Judges a run anew, keeps its tallies, and answers with the steps concerned. `concerned` holds their ids and the
 * readings as they were sent, so that what was filled in is told again when they are sent again.
 */
export async function logged(
  tx: Tx,
  who: Insider,
  ground: RunGround,
  concerned: ReadonlyMap<string, Reading | undefined>,
): Promise<Logged> {
  const { row, layout } = ground;
  const all = await entriesOf(tx, row.workshopId, row.id);
  await rewriteTallies(tx, ground, all);
  const entries = all.filter(({ id }) => concerned.has(id));
  return {
    run: await runSummary(tx, who, row.id),
    entries,
    remarks: entries.flatMap(({ id, seq }) => filledRemarks(layout, seq, concerned.get(id))),
  };
}
