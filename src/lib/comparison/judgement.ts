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
