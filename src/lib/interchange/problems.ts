import type { ProblemCode } from '../mechanism/result';

/** What can be wrong with a CSV file beyond what can be wrong with a step or a reading. */
export const CSV_PROBLEM_CODES = [
  'file-too-large',
  'not-utf-8',
  'utf-16',
  'empty-file',
  'unknown-column',
  'repeated-column',
  'no-operation-column',
  'field-count',
  'quote-not-closed',
  'quote-misplaced',
  'do-unclear',
  'not-for-this-operation',
  'step-repeated',
  'step-falling',
  'bad-time',
  'time-without-offset',
  'too-long',
  'bad-character',
  'more-problems',
] as const;
export type CsvProblemCode = (typeof CSV_PROBLEM_CODES)[number];

/**
 * One thing wrong in a file: `line` is the physical line as an editor counts it (null = the file as a whole),
 * `column` the header name (null = the whole line).
 */
export interface CsvProblem {
  readonly line: number | null;
  readonly column: string | null;
  readonly code: ProblemCode | CsvProblemCode;
  readonly expected?: string;
  readonly found?: string;
}

/** What the reader put right or noticed without being in doubt; said to the person, never in silence. */
export const CSV_REMARK_CODES = [
  'byte-order-mark',
  'lf-line-ends',
  'cr-line-ends',
  'mixed-line-ends',
  'semicolons',
  'tabs',
  'header-tidied',
  'no-rows',
  'blank-row',
  'operation-inferred',
  'word-tidied',
  'zeros-filled',
  'step-gap',
  'time-goes-back',
  'time-finer-than-ms',
  'note-looks-guarded',
] as const;
export type CsvRemarkCode = (typeof CSV_REMARK_CODES)[number];

/** A remark and its place, as in `CsvProblem`. */
export interface CsvRemark {
  readonly line: number | null;
  readonly column: string | null;
  readonly code: CsvRemarkCode;
  readonly found?: string;
  readonly became?: string;
}
