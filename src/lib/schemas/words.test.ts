import { describe, expect, it } from 'vitest';
import { CSV_LIMITS } from '../interchange/limits';
import { CSV_PROBLEM_CODES, CSV_REMARK_CODES } from '../interchange/problems';
import { PROBLEM_CODES, type ProblemCode } from '../mechanism/result';
import { LIMITS } from './limits';
import { detailOf, remarkInWords, wordsOf } from './words';

const codes = [...PROBLEM_CODES, ...CSV_PROBLEM_CODES];
const SENTENCES = /^[A-Z0-9“].*\.$/u;

describe('wordsOf', () => {
  it.each(codes)('says %s in whole sentences, with and without detail', (code) => {
    for (const detail of [{}, { expected: '12', found: '13' }]) {
      const words = wordsOf({ line: 5, column: 'result', code, ...detail });
      expect(words.place).toBe('line 5, column result');
      expect(words.cure).toMatch(SENTENCES);
      if (detail.found) {
        expect(words.what).toMatch(SENTENCES);
        expect(words.what).not.toContain('undefined');
      }
    }
  });

  it('never says two problems with the same words', () => {
    const said = codes.map((code) => detailOf({ line: 1, column: null, code, expected: 'a', found: 'b' }));
    expect(new Set(said).size).toBe(codes.length);
  });

  it('says place, expected, found and cure', () => {
    const code: ProblemCode = 'out-of-range';
    expect(wordsOf({ code, path: ['steps', 3, 'to'], expected: '1 to 6', found: '7' })).toEqual({
      place: 'step 4, to',
      what: '“7” is out of range; expected: 1 to 6.',
      cure: 'Give a number in that range.',
    });
  });

  it('says places as people count', () => {
    const placeOf = (path: (string | number)[]): string => wordsOf({ code: 'missing', path }).place;
    expect(placeOf([])).toBe('as a whole');
    expect(placeOf(['layout', 'resultWheels'])).toBe('layout, resultWheels');
    expect(placeOf(['faults', 0, 'wheel'])).toBe('fault 1, wheel');
    expect(placeOf(['steps', 9, 'read', 'result'])).toBe('step 10, read, result');
    expect(placeOf([2, 'x'])).toBe('item 3, x');
    expect(wordsOf({ line: null, column: null, code: 'not-utf-8' }).place).toBe('the file');
    expect(wordsOf({ line: 3, column: null, code: 'field-count' }).place).toBe('line 3');
  });

  it('quotes a long find shortened, by whole characters', () => {
    const { what } = wordsOf({ code: 'has-sign', path: [], found: '🛠'.repeat(500) });
    expect(what).toContain(`“${'🛠'.repeat(60)}…”`);
    expect(what.length).toBeLessThan(200);
  });
});

describe('remarkInWords', () => {
  it.each(CSV_REMARK_CODES)('says %s', (code) => {
    const { place, what } = remarkInWords({ line: 2, column: 'do', code, found: '3', became: '1' });
    expect(place).toBe('line 2, column do');
    expect(what).toMatch(SENTENCES);
    expect(what).not.toContain('undefined');
  });
});

describe('LIMITS', () => {
  it('are those that the reader of files keeps', () => {
    expect(LIMITS).toMatchObject({
      importBytes: CSV_LIMITS.bytes,
      importRows: CSV_LIMITS.rows,
      noteLength: CSV_LIMITS.noteLength,
    });
  });
});
