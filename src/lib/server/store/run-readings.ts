import { isDeepStrictEqual } from 'node:util';
import { v7 } from 'uuid';
import type { Correction, Logged, RunEntry } from '@/lib/schemas/run-shapes';
import type { Tx } from '../db/client';
import { reading } from '../db/schema/runs';
import { notFound, Refusal, refuseInput } from '../http';
import type { Insider } from './insider';
import { acceptedReading } from './run-doors';
import { logged } from './run-judged';
import { readingColumns } from './run-rows';
import { entriesOf, groundOf } from './runs';

/** Whether the last correction of a step is this very one, whose answer its sender may never have got. */
function isResent({ corrections }: RunEntry, { reason }: Correction): boolean {
  const last = corrections.at(-1);
  return last === undefined || last.why === reason;
}

/**
 * Puts a reading right, or adds one where there was none; what stood there before stays in sight. A reading that says
 * what stands there already changes nothing, so that sending it again is harmless.
 */
export async function correctReading(tx: Tx, who: Insider, id: string | undefined, sent: Correction): Promise<Logged> {
  const ground = await groundOf(tx, who, id, true);
  const { row, layout } = ground;
  const entry = (await entriesOf(tx, row.workshopId, row.id)).find(({ seq }) => seq === sent.seq);
  if (!entry || entry.withdrawn) throw notFound('There is no such step, or it has been taken back.');
  const columns = acceptedReading(layout, sent.reading);
  const concerned = new Map([[entry.id, sent.reading]]);
  const seen = sent.replaces === undefined || sent.replaces === entry.readingId;
  const saysTheSame = isDeepStrictEqual(columns, readingColumns(entry.step.read));
  if (saysTheSame && (seen || isResent(entry, sent))) return logged(tx, who, ground, concerned);
  if (!seen)
    throw new Refusal(409, { detail: 'This reading has been corrected by somebody else meanwhile. Look at it again.' });
  if (entry.readingId && !sent.reason)
    refuseInput([{ pointer: '/reason', detail: 'Say why; both readings stay with the run.' }]);
  await tx.insert(reading).values({
    workshopId: row.workshopId,
    id: v7(),
    runId: row.id,
    seq: sent.seq,
    ...columns,
    recordedBy: who.person.id,
    replaces: entry.readingId,
    reason: entry.readingId ? sent.reason : null,
  });
  return logged(tx, who, ground, concerned);
}
