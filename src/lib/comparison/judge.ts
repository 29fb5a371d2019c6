import { digitsOf } from '../mechanism/registers';
import {
  anythingDue,
  type Due,
  directionOf,
  drivenBy,
  dueAbove,
  modulo,
  nothingDue,
  type Seen,
  stepsBetween,
} from './due';
import type { LadderWheel, Verdict } from './judgement';
import { onlyDigit, possibleDigits } from './possible';
import type { Stretch, Track } from './track';

interface Judged {
  readonly carryDue: boolean | null;
  readonly carryMade: boolean | null;
  /** Whether the reading is what the drive and the carries really due come to. */
  readonly explained: boolean;
}

const SILENT: Judged = { carryDue: null, carryMade: null, explained: false };

/** Of how each digit possible at the outset would explain the reading. */
interface Fits {
  exact: boolean;
  /** With some of the carries due left out. */
  missed: boolean;
  /** With carries that nobody asked for. */
  extra: boolean;
  /** Short, with nothing to say that a carry had a part in it. */
  short: boolean;
}

function fitsOf(seen: Seen, expected: number, net: number, turns: number, sign: number): Fits {
  const fits: Fits = { exact: false, missed: false, extra: false, short: false };
  const shown = seen.after[0] ?? 0;
  for (const digit of seen.before) {
    const off = sign * stepsBetween(digit + expected, shown);
    const lacking = modulo(-off);
    if (off === 0) fits.exact = true;
    else {
      if (lacking <= Math.min(9, Math.abs(net))) fits.missed = true;
      if (off > 0 && off <= turns - Math.abs(net)) fits.extra = true;
      if (off < 0) fits.short = true;
    }
  }
  return fits;
}

/** Whether a wheel that was driven stood still in its one turn: then nothing can be said of its carry. */
function stoodStill(track: Track, seen: Seen, driven: number): boolean {
  const one = track.forward + track.backward === 1 && seen.before.length === 1;
  return one && driven !== 0 && seen.before[0] === seen.after[0];
}

/** Whether as many carries were made as were due; null where the reading does not tell. */
function carryMade(track: Track, seen: Seen, due: Due, driven: number, net: number): boolean | null {
  if (due.any === null || due.gross === null || seen.after.length !== 1) return null;
  const turns = track.forward + track.backward;
  const oneWay = directionOf(track);
  // Carries both ways may make each other good: only where all due ones go one way does a step off tell.
  const sign = due.gross === Math.abs(net) && net !== 0 ? Math.sign(net) : oneWay;
  const fits = fitsOf(seen, driven + net, net, turns, sign === 0 ? 1 : sign);
  if (!fits.exact && stoodStill(track, seen, driven)) return null;
  if (due.any) {
    if (sign === 0) return fits.exact && seen.before.length === 1 ? true : null;
    const made = fits.exact || (fits.extra && oneWay !== 0);
    return made === fits.missed ? null : made;
  }
  if (fits.exact) return false;
  if (fits.extra) return fits.short ? null : true;
  return fits.short && oneWay !== 0 ? false : null;
}

function judgeCarry(track: Track, stretches: readonly Stretch[], wheel: number, seen: Seen, due: Due): Judged {
  const last = stretches.length - 1;
  const driven = last < 0 ? 0 : (drivenBy(stretches, wheel)[last] ?? 0);
  const [fewest, most] = last < 0 ? [0, 0] : [due.fewest[last] ?? 0, due.most[last] ?? 0];
  const shown = seen.after.length === 1 ? (seen.after[0] ?? 0) : null;
  let explained = false;
  for (const digit of shown === null ? [] : seen.before)
    for (let carries = fewest; carries <= Math.min(most, fewest + 9); carries += 1)
      explained ||= modulo(digit + driven + carries) === shown;
  const made = fewest === most ? carryMade(track, seen, due, driven, fewest) : null;
  return { carryDue: due.any, carryMade: made, explained };
}

/** Carries due and made, wheel by wheel from the lowest: each rests on what the one below really did. */
function judgeCarries(track: Track, glyphs: readonly string[], excluded: ReadonlySet<number>): Judged[] {
  const { stretches } = track;
  if (!stretches) return glyphs.map((_, wheel) => (wheel === 0 ? { ...SILENT, carryDue: false } : SILENT));
  let due = nothingDue(stretches);
  return glyphs.map((glyph, wheel) => {
    const seen: Seen = { before: track.sets[wheel] ?? [], after: digitsOf(glyph) };
    const judged = judgeCarry(track, stretches, wheel, seen, due);
    due = excluded.has(wheel) ? anythingDue(stretches, wheel + 1) : dueAbove(track, stretches, wheel, seen, due);
    return judged;
  });
}

function verdictOf(glyph: string, possible: number, excluded: boolean): Verdict {
  if (excluded) return 'excluded';
  if (glyph === '?') return 'unread';
  if (glyph.length > 1) return 'between';
  return (possible & (1 << Number(glyph))) !== 0 ? 'agrees' : 'differs';
}

/**
 * Judges one register of a reading. `glyphs` and `expected` (digits from the start) run from wheel 1;
 * `glyphs` is null where the register was not read. `excluded` holds wheel indexes, 0 = wheel 1.
 */
export function judgeRegister(
  track: Track,
  glyphs: readonly string[] | null,
  expected: Readonly<Uint8Array>,
  excluded: ReadonlySet<number>,
): LadderWheel[] {
  const read = glyphs ?? Array.from(expected, () => '?');
  const possible = possibleDigits(track, excluded);
  const carries = judgeCarries(track, read, excluded);
  return read.map((glyph, index) => {
    const digits = possible[index] ?? 0;
    const verdict = verdictOf(glyph, digits, excluded.has(index));
    const fromLast = onlyDigit(digits);
    const carry = carries[index] ?? SILENT;
    const numeral = glyph !== '?' && glyph.length === 1 ? Number(glyph) : null;
    return {
      wheel: index + 1,
      read: glyph,
      expected: expected[index] ?? 0,
      expectedFromLast: fromLast,
      verdict,
      stepsOff: fromLast === null || numeral === null ? null : stepsBetween(fromLast, numeral),
      carryDue: carry.carryDue,
      carryMade: carry.carryMade,
      follows: verdict === 'differs' && carry.explained,
    };
  });
}
