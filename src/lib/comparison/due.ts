import type { Stretch, Track } from './track';

/**
 * Carries that the wheel below really owed a wheel: what its motion between two readings came to, right or wrong.
 * Counts are net (forward less backward) and cumulative, one for the end of each stretch; where more than one is
 * possible they are a range. A wheel that nobody can say anything about owes a wide range, never a guess.
 */
export interface Due {
  readonly fewest: readonly number[];
  readonly most: readonly number[];
  /** Carries made due in all, whichever way; null where that is not certain. */
  readonly gross: number | null;
  /** Whether at least one was due; null where that is not certain. */
  readonly any: boolean | null;
}

/** What a wheel showed at both ends of a track. */
export interface Seen {
  /** Digits possible at the outset, rising. */
  readonly before: readonly number[];
  /** Digits the reading leaves possible, rising; ten where the wheel was not read. */
  readonly after: readonly number[];
}

export const modulo = (value: number): number => ((value % 10) + 10) % 10;

/** Steps from one digit to another, −4 to +5. */
export function stepsBetween(from: number, to: number): number {
  const steps = modulo(to - from);
  return steps > 5 ? steps - 10 : steps;
}

/** Counts of carries tried one by one: after ten, the same digits come again. */
const MOST_TRIED = 10;

/** The net steps that a wheel was driven by the end of each stretch, without carries. */
export function drivenBy(stretches: readonly Stretch[], wheel: number): number[] {
  let sum = 0;
  return stretches.map(({ backward, moves }) => {
    sum += (backward ? -1 : 1) * (moves[wheel] ?? 0);
    return sum;
  });
}

/** Lowest and highest of a count of steps or of passes. */
interface Span {
  low: number;
  high: number;
}

/** How often the edge has been passed at a sum of steps from numeral 0. */
const passesOf = (sum: number): number => Math.floor(sum / 10);

/** One turn tells its own motion, but for standing still against going right round. */
function singleTurn(digit: number, shown: number, expected: number, backward: boolean): number[] {
  const sign = backward ? -1 : 1;
  const steps = modulo(sign * (shown - digit));
  const round = steps + 10;
  const sums = round <= 11 && sign * expected >= 8 ? [steps, round] : [steps];
  return sums.map((motion) => digit + sign * motion);
}

/** Over several turns the nearest deviation, and from two steps on also the one the other way round. */
function severalTurns(digit: number, shown: number, expected: number, oneWay: number): number[] {
  const off = stepsBetween(digit + expected, shown);
  const offs = Math.abs(off) < 2 ? [off] : [off, off > 0 ? off - 10 : off + 10];
  return offs.map((steps) => digit + expected + steps).filter((sum) => (sum - digit) * oneWay >= 0);
}

interface Found {
  /** Sums possible at the end of the last stretch. */
  readonly sums: readonly number[];
  /** Bounds of the digit at the outset, and of the steps gone astray by the end. */
  readonly digits: Span;
  readonly astray: Span;
}

/** +1 or −1 where all turns went one way, else 0. */
export function directionOf(track: Track): number {
  return track.backward === 0 ? 1 : track.forward === 0 ? -1 : 0;
}

/** Pairs of digits that fit the drive and the carries due exactly. */
function fitting(seen: Seen, driven: number, fewest: number, most: number): Found | null {
  const sums: number[] = [];
  const digits: number[] = [];
  for (const digit of seen.before)
    for (let carries = fewest; carries <= most && carries < fewest + MOST_TRIED; carries += 1) {
      const sum = digit + driven + carries;
      if (!seen.after.includes(modulo(sum))) continue;
      digits.push(digit);
      sums.push(sum);
      // The same digit is reached again ten carries later, and last by the highest such count.
      sums.push(sum + 10 * Math.floor((most - carries) / 10));
    }
  if (sums.length === 0) return null;
  return { sums, digits: boundsOf(digits), astray: { low: 0, high: 0 } };
}

function boundsOf(values: readonly number[]): Span {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const value of values) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return { low, high };
}

/** What a wheel that did not do as driven may have done; null where nothing can be said. */
function straying(track: Track, seen: Seen, driven: number, fewest: number, most: number): Found | null {
  if (track.cleared || most - fewest >= MOST_TRIED) return null;
  const oneWay = directionOf(track);
  const single = track.forward + track.backward === 1;
  const sums: number[] = [];
  const astray: number[] = [0];
  for (const digit of seen.before)
    for (const shown of seen.after)
      for (let carries = fewest; carries <= most; carries += 1) {
        const expected = driven + carries;
        const reached = single
          ? singleTurn(digit, shown, expected, oneWay < 0)
          : severalTurns(digit, shown, expected, oneWay);
        if (reached.length === 0) return null;
        sums.push(...reached);
        astray.push(...reached.map((sum) => sum - digit - expected));
      }
  return { sums, digits: boundsOf(seen.before), astray: boundsOf(astray) };
}

/** The furthest a wheel is thought to have run on where nobody read it; a difference is told up to +5. */
const RUN_ON = 5;

/** An unread wheel may have stood still, or run on; null where that bounds nothing. */
function unseen(track: Track, seen: Seen, driven: number, fewest: number, most: number): Found | null {
  const oneWay = directionOf(track);
  if (oneWay === 0 || (track.stretches?.length ?? 0) > 1) return null;
  const digits = boundsOf(seen.before);
  const sums =
    oneWay > 0
      ? [digits.low, digits.high + driven + most + RUN_ON]
      : [digits.low + driven + fewest - RUN_ON, digits.high];
  return { sums, digits, astray: { low: 0, high: 0 } };
}

/** Most carries that a stretch can make due to the wheel above, as a range of net counts. */
function bounds(stretch: Stretch, into: number): Span {
  if (into > stretch.reach) return { low: 0, high: 0 };
  return stretch.backward ? { low: -stretch.turns, high: 0 } : { low: 0, high: stretch.turns };
}

/** Puts the passes of each stretch together into what is due to the wheel above. */
function dueFrom(stretches: readonly Stretch[], into: number, passes: readonly Span[] | null): Due {
  const fewest: number[] = [];
  const most: number[] = [];
  let [low, high] = [0, 0];
  let before: Span = { low: 0, high: 0 };
  let gross: number | null = 0;
  let any: boolean | null = false;
  stretches.forEach((stretch, index) => {
    const limits = bounds(stretch, into);
    const by = passes?.[index] ?? null;
    const least = by ? Math.min(limits.high, Math.max(limits.low, by.low - before.high)) : limits.low;
    const greatest = by ? Math.max(limits.low, Math.min(limits.high, by.high - before.low)) : limits.high;
    if (by) before = by;
    low += least;
    high += greatest;
    // Where every stretch so far reaches this wheel, the passes themselves are the closer bounds.
    const whole = by !== null && stretches.slice(0, index + 1).every(({ reach }) => reach >= into);
    if (whole) [low, high] = [Math.max(low, by.low), Math.min(high, by.high)];
    fewest.push(Math.min(low, high));
    most.push(Math.max(low, high));
    const certain = least === greatest;
    gross = gross !== null && certain ? gross + Math.abs(least) : null;
    if (least > 0 || greatest < 0) any = true;
    else if (!certain && any === false) any = null;
  });
  return { fewest, most, gross, any };
}

/** Nothing is due to the lowest wheel. */
export function nothingDue(stretches: readonly Stretch[]): Due {
  const none = stretches.map(() => 0);
  return { fewest: none, most: none, gross: 0, any: false };
}

/** Anything may be due from a wheel that is left out of the judgement. */
export function anythingDue(stretches: readonly Stretch[], into: number): Due {
  return dueFrom(stretches, into, null);
}

/** What wheel `wheel` (0 = units) made due to the one above, from what was seen of it and what was due to it. */
export function dueAbove(track: Track, stretches: readonly Stretch[], wheel: number, seen: Seen, due: Due): Due {
  const last = stretches.length - 1;
  if (last < 0) return due;
  const driven = drivenBy(stretches, wheel);
  const [end, fewest, most] = [driven[last] ?? 0, due.fewest[last] ?? 0, due.most[last] ?? 0];
  const read = seen.after.length < 10;
  const found = read
    ? (fitting(seen, end, fewest, most) ?? straying(track, seen, end, fewest, most))
    : unseen(track, seen, end, fewest, most);
  if (!found) return anythingDue(stretches, wheel + 1);
  const { low, high } = boundsOf(found.sums);
  const passes = stretches.map((_, index): Span => {
    if (index === last) return { low: passesOf(low), high: passesOf(high) };
    const steps = driven[index] ?? 0;
    return {
      low: passesOf(found.digits.low + steps + (due.fewest[index] ?? 0) + Math.min(0, found.astray.low)),
      high: passesOf(found.digits.high + steps + (due.most[index] ?? 0) + Math.max(0, found.astray.high)),
    };
  });
  return dueFrom(stretches, wheel + 1, passes);
}
