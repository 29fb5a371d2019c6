import { createComparer, type JudgedReading, type Place } from '@/lib/comparison/compare';
import type { Layout } from '@/lib/mechanism/layout';
import type { Operation, Reading, Start, Step } from '@/lib/mechanism/steps';
import { isOwnFault, operationWords } from './words';

/** A reading that was put right afterwards. Times are written out by whoever makes the entry. */
export interface LadderCorrection {
  readonly was: Reading;
  readonly who: string;
  readonly when: string;
  readonly why: string;
}

/** A step that was taken back: it stays in sight and is not judged. */
export interface LadderWithdrawal {
  readonly who: string;
  readonly when: string;
  readonly why: string;
}

/** One step of a run as the ladder takes it. The step must have passed the doors of `mechanism/accept`. */
export interface LadderEntry {
  /** Number of the step within the run, as people call it. */
  readonly seq: number;
  /** With its reading as it stands now, corrections taken in. */
  readonly step: Step;
  readonly note?: string | undefined;
  /** When it was done, written out (`09:05:12`). */
  readonly at?: string | undefined;
  /** Oldest first. */
  readonly corrections?: readonly LadderCorrection[] | undefined;
  readonly withdrawn?: LadderWithdrawal | undefined;
}

/** One row of the ladder: what was done, how the machine stood, what was read and how it is judged. */
export interface LadderRow {
  readonly seq: number;
  readonly operation: Operation;
  /** The operation in a few characters. */
  readonly words: string;
  /** Null where nothing was read, and where the step was taken back. */
  readonly judged: JudgedReading | null;
  readonly slides: string;
  readonly carriage: number;
  readonly reversed: boolean;
  readonly note: string;
  readonly at: string;
  readonly corrections: readonly LadderCorrection[];
  readonly withdrawn: LadderWithdrawal | null;
  /** Wheels that are wrong by themselves. */
  readonly faults: number;
  /** Wheels that differ only because of what the wheels below did. */
  readonly consequences: number;
}

/** What rows are judged against, beyond the layout. */
export interface RowOptions {
  readonly start?: Start | undefined;
  readonly excluded?: readonly Place[] | undefined;
}

/** Makes rows one by one, so that a ladder grows in constant work a step. */
export interface RowBuilder {
  take(entry: LadderEntry): LadderRow;
}

const NONE: readonly LadderCorrection[] = [];

function countWheels(judged: JudgedReading | null): { faults: number; consequences: number } {
  const wheels = judged ? [...judged.result, ...judged.counter] : [];
  return {
    faults: wheels.filter(isOwnFault).length,
    consequences: wheels.filter(({ follows }) => follows).length,
  };
}

export function createRowBuilder(layout: Layout, options: RowOptions = {}): RowBuilder {
  const comparer = createComparer(layout, options);
  return {
    take: (entry) => {
      const { read: _, ...operation } = entry.step;
      const judged = entry.withdrawn ? null : comparer.take(entry.step);
      const { slides, carriage, reversed } = comparer.standing;
      return {
        seq: entry.seq,
        operation,
        words: operationWords(operation),
        judged,
        slides,
        carriage,
        reversed,
        note: entry.note ?? '',
        at: entry.at ?? '',
        corrections: entry.corrections ?? NONE,
        withdrawn: entry.withdrawn ?? null,
        ...countWheels(judged),
      };
    },
  };
}

/** All rows of a run at once. */
export function buildRows(layout: Layout, entries: readonly LadderEntry[], options: RowOptions = {}): LadderRow[] {
  const builder = createRowBuilder(layout, options);
  return entries.map((entry) => builder.take(entry));
}
