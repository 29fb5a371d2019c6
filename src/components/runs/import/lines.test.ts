import { describe, expect, it } from 'vitest';
import { linesOf, needsALook } from './lines';

const row = (line: number, remarks: string[] = []) => ({
  line,
  understood: 'one turn',
  step: { do: 'turn', way: 'add' } as const,
  note: '',
  at: null,
  remarks,
});

describe('the lines of a checked file', () => {
  it('stand in the order of the file, what concerns all of it first', () => {
    const lines = linesOf({
      rows: [row(2), row(5, ['zeros filled'])],
      problems: [
        { line: 3, column: 'way', what: 'unknown', cure: 'write add' },
        { line: null, column: null, what: 'not UTF-8', cure: 'save anew' },
        { line: 3, column: 'times', what: 'no number', cure: 'write 1' },
      ],
    });
    expect(lines.map(({ line, is }) => [line, is])).toEqual([
      [null, 'wrong'],
      [2, 'understood'],
      [3, 'wrong'],
      [3, 'wrong'],
      [5, 'understood'],
    ]);
    expect(lines.filter(needsALook)).toHaveLength(4);
  });
});
