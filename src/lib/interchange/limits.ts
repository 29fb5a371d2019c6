/** Most a CSV import may hold in its first form; `schemas/limits.ts` hands these on beside the others. */
export const CSV_LIMITS = {
  /** Bytes of one file. */
  bytes: 1_048_576,
  /** Rows of steps, the header row not counted. */
  rows: 10_000,
  /** Characters (code points) of one note. */
  noteLength: 500,
  /** Problems listed of one file; reading stops there. More helps nobody, and would be a large answer to a small file. */
  problems: 1_000,
} as const;
