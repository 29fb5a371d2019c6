import { accept, type Problem, type ProblemCode, type Result, refuse } from './result';

/** A glyph as the tester reads it: a numeral, a numeral and the next one up (`4~`), or `?`. */
export interface ReadGlyphs {
  /** One glyph a wheel, wheel 1 (units) first. */
  readonly glyphs: readonly string[];
  /** How many wheels on the left were left out and taken as zeros; the reader must be told. */
  readonly filled: number;
}

const SPACING = /[\s_]/gu;
const GLYPH = /\?|[0-9]~?/gu;
const EXPONENT = /[0-9?~][eE][+\-−–]?[0-9]/u;
const SIGN = /[+\-−–]/u;
const POINT = /[.,]/u;

/** What makes a text no register at all, the most telling first: an exponent also holds a sign and a point. */
function objection(text: string, glyph: RegExp): { code: ProblemCode; found: string } | null {
  if (EXPONENT.test(text)) return { code: 'has-exponent', found: text };
  if (SIGN.test(text)) return { code: 'has-sign', found: text };
  if (POINT.test(text)) return { code: 'has-decimal-point', found: text };
  const rest = text.replace(glyph, '');
  return rest === '' ? null : { code: 'bad-glyph', found: [...rest][0] ?? rest };
}

function parse(text: string, wheels: number, glyph: RegExp, tooMany: ProblemCode): Result<ReadGlyphs> {
  const bare = text.replace(SPACING, '');
  const objected = objection(bare, glyph);
  if (objected) return refuse({ ...objected, path: [], expected: `${wheels}` });
  const found = bare.match(glyph) ?? [];
  // An empty cell is not a register full of zeros, unless there is no wheel to read.
  if (found.length === 0 && wheels > 0) return refuse({ code: 'missing', path: [], expected: `${wheels}` });
  if (found.length > wheels)
    return refuse({
      code: tooMany,
      path: [],
      expected: `${wheels}`,
      found: `${found.length}`,
    });
  const filled = wheels - found.length;
  const glyphs = [...found].reverse().concat(new Array<string>(filled).fill('0'));
  return accept({ glyphs, filled });
}

/**
 * Reads what stands in the windows, highest wheel first. Spaces and underscores are ignored, fewer glyphs than
 * wheels are filled with zeros on the left (spreadsheets strip them) and counted. Nothing else is guessed:
 * too many glyphs, a sign, a decimal comma or point and an exponent are problems, with an empty `path`.
 */
export function readGlyphs(text: string, wheels: number): Result<ReadGlyphs> {
  return parse(text, wheels, GLYPH, 'too-many-glyphs');
}

/** Writes glyphs (wheel 1 first) canonically: highest wheel first, nothing between. */
export function writeGlyphs(glyphs: readonly string[]): string {
  return [...glyphs].reverse().join('');
}

const EVERY_DIGIT: readonly number[] = [0, 1, 2, 3, 4, 5, 6, 7, 8, 9];
const ALONE: readonly (readonly number[])[] = EVERY_DIGIT.map((digit) => [digit]);
const BETWEEN: readonly (readonly number[])[] = EVERY_DIGIT.map((digit) => (digit === 9 ? [0, 9] : [digit, digit + 1]));

/** Digits a glyph leaves possible, rising: one for a numeral, two for a wheel between, all for `?`. */
export function digitsOf(glyph: string): readonly number[] {
  const digit = glyph.charCodeAt(0) - 48;
  return (glyph.length === 1 ? ALONE[digit] : BETWEEN[digit]) ?? EVERY_DIGIT;
}

/** Reads a register or slides of digits only, wheel 1 first. `tooMany` is the code for more digits than places. */
export function readDigits(text: string, places: number, tooMany: ProblemCode = 'too-many-glyphs'): Result<Uint8Array> {
  const read = parse(text, places, /[0-9]/gu, tooMany);
  return read.ok ? accept(Uint8Array.from(read.value.glyphs, Number)) : read;
}

/** Writes digits (wheel 1 first) as on the machine, highest first. */
export function writeDigits(digits: ArrayLike<number>): string {
  let text = '';
  for (let wheel = digits.length - 1; wheel >= 0; wheel -= 1) text += String.fromCharCode(48 + (digits[wheel] ?? 0));
  return text;
}

/** Puts a place in front of every problem, for doors that pass a field on. */
export function under(path: readonly (string | number)[], problems: readonly Problem[]): Problem[] {
  return problems.map((problem) => ({
    ...problem,
    path: [...path, ...problem.path],
  }));
}
