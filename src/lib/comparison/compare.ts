import type { Layout } from '../mechanism/layout';
import type { Operation, Register, Start, Step } from '../mechanism/steps';

export const VERDICTS = ['agrees', 'differs', 'between', 'unread', 'excluded'] as const;
export type Verdict = (typeof VERDICTS)[number];

/** One wheel of one reading. Wheels count from 1 = units. */
export interface WheelJudgement {
  readonly wheel: number;
  /** The glyph as read (`7`, `4~`, `?`); `?` also where the register was not read at all. */
  readonly read: string;
  /** What stands here on a healthy machine run from the first step. */
  readonly expected: number;
  /** What a healthy machine run from the last reading shows; null where more than one digit is possible. */
  readonly expectedFromLast: number | null;
  readonly verdict: Verdict;
  /** −4…+5 steps against `expectedFromLast`; null where that or the reading is not one digit. */
  readonly stepsOff: number | null;
  readonly carryDue: boolean | null;
  readonly carryMade: boolean | null;
}

/** `WheelJudgement` with what the ladder needs beyond the public answer. */
export interface LadderWheel extends WheelJudgement {
  /**
   * True where a wheel differs only because of what the wheels below it did or left undone (a carry that never
   * came because the wheel below did not pass 9→0): drawn softly, as a consequence and not as a fault of its own.
   */
  readonly follows: boolean;
}

/** A reading judged. `step` is the index of its step; wheels run from wheel 1 (units) up. */
export interface JudgedReading {
  readonly step: number;
  readonly result: readonly LadderWheel[];
  readonly counter: readonly LadderWheel[];
}

export interface Place {
  readonly register: Register;
  readonly wheel: number;
}

export interface Comparison {
  readonly agrees: boolean;
  readonly readings: readonly JudgedReading[];
  readonly firstFault: { readonly step: number; readonly register: Register; readonly wheel: number } | null;
}

/** Where a machine stands between readings, for the bench's next step: what a healthy one would show now. */
export interface Standing {
  readonly result: string;
  readonly counter: string;
  readonly slides: string;
  readonly carriage: number;
  readonly reversed: boolean;
}

/** Judges a run step by step, in constant work a step, so that a ladder can grow row by row. */
export interface Comparer {
  /** Takes the next step; answers with the judged reading if the step carries one, else null. */
  take(step: Step): JudgedReading | null;
  readonly standing: Standing;
}

export interface ComparisonInput {
  readonly layout: Layout;
  readonly start?: Start | undefined;
  readonly steps: readonly Step[];
  readonly excluded?: readonly Place[] | undefined;
}

export declare function createComparer(
  layout: Layout,
  options?: { start?: Start | undefined; excluded?: readonly Place[] | undefined },
): Comparer;
export declare function compare(input: ComparisonInput): Comparison;
/** The operation without its reading, for showing and logging. */
export declare function operationOf(step: Step): Operation;
