import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { digitsOf, readDigits, readGlyphs, writeDigits, writeGlyphs } from './registers';

const problemOf = (text: string, wheels = 11) => {
  const read = readGlyphs(text, wheels);
  return read.ok ? null : read.problems;
};

describe('readings', () => {
  it('are read highest wheel first and kept lowest first', () => {
    expect(readGlyphs('9 4~?_07', 5)).toEqual({ ok: true, value: { glyphs: ['7', '0', '?', '4~', '9'], filled: 0 } });
  });

  it('are filled with zeros on the left, and say so', () => {
    expect(readGlyphs('305', 6)).toEqual({
      ok: true,
      value: { glyphs: ['5', '0', '3', '0', '0', '0'], filled: 3 },
    });
  });

  it.each([
    ['1.23457E+14', 'has-exponent'],
    ['1,23457E+14', 'has-exponent'],
    ['1e5', 'has-exponent'],
    ['-5', 'has-sign'],
    ['+5', 'has-sign'],
    ['\u22125', 'has-sign'],
    ['1.5', 'has-decimal-point'],
    ['1,5', 'has-decimal-point'],
    ['12a4', 'bad-glyph'],
    ['~4', 'bad-glyph'],
    ['4~~', 'bad-glyph'],
    ['?~', 'bad-glyph'],
    ['\u0663', 'bad-glyph'],
    ['123456789012', 'too-many-glyphs'],
    ['', 'missing'],
    [' _ ', 'missing'],
  ])('%j is refused: %s', (text, code) => {
    expect(problemOf(text)).toEqual([expect.objectContaining({ code, path: [] })]);
  });

  it('name the glyph that is none, and the number of glyphs', () => {
    expect(problemOf('12a4')?.[0]).toMatchObject({ found: 'a' });
    expect(problemOf('1234', 3)?.[0]).toMatchObject({ expected: '3', found: '4' });
  });

  it('of a register without wheels are empty', () => {
    expect(readGlyphs('', 0)).toEqual({ ok: true, value: { glyphs: [], filled: 0 } });
    expect(problemOf('0', 0)?.[0]?.code).toBe('too-many-glyphs');
  });

  it('come back as written, with spacing and without', () => {
    const glyph = fc.constantFrom(...'0123456789?', '4~', '9~', '0~');
    fc.assert(
      fc.property(
        fc.array(glyph, { minLength: 1, maxLength: 32 }),
        fc.constantFrom('', ' ', '_', ' _ '),
        (all, gap) => {
          const read = readGlyphs(all.join(gap), all.length);
          expect(read.ok && writeGlyphs(read.value.glyphs)).toBe(all.join(''));
        },
      ),
    );
  });

  it('never throw, whatever is written', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), fc.integer({ min: 0, max: 32 }), (text, wheels) => {
        const read = readGlyphs(text, wheels);
        if (read.ok) expect(read.value.glyphs).toHaveLength(wheels);
        else expect(read.problems.length).toBeGreaterThan(0);
      }),
      { numRuns: 500 },
    );
  });
});

describe('digits', () => {
  it('of a glyph are what it leaves possible', () => {
    expect(digitsOf('7')).toEqual([7]);
    expect(digitsOf('4~')).toEqual([4, 5]);
    expect(digitsOf('9~')).toEqual([0, 9]);
    expect(digitsOf('?')).toHaveLength(10);
  });

  it('are read without marks and written back', () => {
    const read = readDigits('00305', 5);
    expect(read.ok && writeDigits(read.value)).toBe('00305');
    expect(readDigits('3?5', 5)).toMatchObject({ ok: false, problems: [{ code: 'bad-glyph' }] });
    expect(readDigits('123', 2, 'digit-beyond-slides')).toMatchObject({
      ok: false,
      problems: [{ code: 'digit-beyond-slides', expected: '2', found: '3' }],
    });
  });
});
