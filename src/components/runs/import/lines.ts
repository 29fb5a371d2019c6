import type { CheckedFile } from '@/lib/schemas/import-shapes';

/** One line of a checked file as it is told: understood, with what was put right, or wrong, with its cure. */
export type Line =
  | {
      readonly is: 'understood';
      readonly line: number;
      readonly said: string;
      readonly note: string;
      readonly remarks: readonly string[];
    }
  | {
      readonly is: 'wrong';
      /** Null = the file as a whole. */
      readonly line: number | null;
      readonly column: string | null;
      readonly said: string;
      readonly cure: string;
    };

/** Everything that a check says, in the order of the file; what concerns it as a whole comes first. */
export function linesOf({ rows, problems }: Pick<CheckedFile, 'rows' | 'problems'>): Line[] {
  const understood = rows.map(
    ({ line, understood: said, note, remarks }): Line => ({ is: 'understood', line, said, note, remarks }),
  );
  const wrong = problems.map(({ line, column, what: said, cure }): Line => ({ is: 'wrong', line, column, said, cure }));
  return [...wrong, ...understood].sort((one, other) => (one.line ?? 0) - (other.line ?? 0));
}

/** Whether somebody should look at a line before the file is stored. */
export function needsALook(line: Line): boolean {
  return line.is === 'wrong' || line.remarks.length > 0;
}
