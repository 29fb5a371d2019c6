import type { LadderEntry } from '@/components/ladder/rows';
import type { RunEntry } from '@/lib/schemas/run-shapes';
import type { Kept } from './pack';
import { clockWords, minuteWords } from './times';

/** A step as the ladder takes it, times written out in the workshop's zone. */
export function ladderEntry(kept: Omit<Kept, 'id' | 'readingId'> | RunEntry, zone: string): LadderEntry {
  const { seq, step, note, at, corrections, withdrawn } = kept;
  return {
    seq,
    step,
    note,
    ...(at && { at: clockWords(at) }),
    corrections: corrections.map((one) => ({
      ...one,
      when: minuteWords(one.when, zone),
    })),
    ...(withdrawn && {
      withdrawn: { ...withdrawn, when: minuteWords(withdrawn.when, zone) },
    }),
  };
}
