import type { Stretch, Track } from './track';

/**
 * Which digits a healthy machine may show after a track, from what was possible at its outset. A digit set is ten
 * bits, bit 0 = digit 0.
 *
 * At any time a wheel has passed its edge floor((digit + steps) / 10) times, forward passes counting up and
 * backward ones down. While all turns carry equally far only the end of the track matters, and the carries into a
 * wheel can be any number between the fewest and the most: the digits below are independent of each other, and
 * the steps between two possible sums are less than ten. So a range a wheel is exact, whatever was unread.
 * Where the reach changes on the way, the carries of each stretch are kept apart, as a list of all combinations.
 */
export type DigitSet = number;

export const ANY_DIGIT: DigitSet = 0x3ff;

/** More combinations of carries than any track of a few stretches has; beyond, a wheel's digit is not known. */
const MOST_COMBINATIONS = 512;

const modulo = (value: number): number => ((value % 10) + 10) % 10;

/** The lowest and highest of a rising list that is never empty. */
function ends(set: readonly number[]): [number, number] {
  return [set[0] ?? 0, set[set.length - 1] ?? 9];
}

function digitsAfter(set: readonly number[], steps: number, fewest: number, most: number): DigitSet {
  let digits = 0;
  const highest = Math.min(most, fewest + 9);
  for (const digit of set)
    for (let carries = fewest; carries <= highest; carries += 1) digits |= 1 << modulo(digit + steps + carries);
  return digits;
}

/** For wheels up to `leastReach`, and for those above `mostReach`; what lies between is not known. */
function byRange(track: Track, excluded: ReadonlySet<number>): DigitSet[] {
  const possible: DigitSet[] = [];
  let [fewest, most] = [0, 0];
  for (let wheel = 0; wheel < track.wheels; wheel += 1) {
    if (wheel > track.mostReach) [fewest, most] = [0, 0];
    const set = track.sets[wheel] ?? [];
    const net = track.net[wheel] ?? 0;
    if (wheel > track.leastReach && wheel <= track.mostReach) {
      possible.push(ANY_DIGIT);
      continue;
    }
    possible.push(digitsAfter(set, net, fewest, most));
    const [low, high] = ends(set);
    // What an excluded wheel does is not known: it may carry in any turn, or in none.
    if (excluded.has(wheel)) [fewest, most] = [-track.backward, track.forward];
    else {
      // A carry on top of a full round passes the edge once all the same; only an excluded wheel can make one.
      const lost = excluded.has(wheel - 1) ? (track.rounds[wheel] ?? 0) : 0;
      fewest = Math.max(-track.backward, Math.floor((low + net + fewest) / 10) - lost);
      most = Math.min(track.forward, Math.floor((high + net + most) / 10));
    }
  }
  return possible;
}

interface Reach {
  readonly reach: number;
  forward: number;
  backward: number;
  readonly net: Float64Array;
}

/** Stretches of the same reach made one: within them only the end matters. */
function byReach(stretches: readonly Stretch[], wheels: number): Reach[] {
  const groups: Reach[] = [];
  for (const stretch of stretches) {
    let group = groups.at(-1);
    if (group?.reach !== stretch.reach) {
      group = { reach: stretch.reach, forward: 0, backward: 0, net: new Float64Array(wheels) };
      groups.push(group);
    }
    if (stretch.backward) group.backward += stretch.turns;
    else group.forward += stretch.turns;
    const sign = stretch.backward ? -1 : 1;
    for (let wheel = 0; wheel < wheels; wheel += 1)
      group.net[wheel] = (group.net[wheel] ?? 0) + sign * (stretch.moves[wheel] ?? 0);
  }
  return groups;
}

type Carries = readonly number[];

/** Distinct lists of numbers; null when there are too many. */
class Combinations {
  private readonly known = new Map<string, Carries>();
  add(carries: Carries): void {
    if (this.known.size <= MOST_COMBINATIONS) this.known.set(carries.join(), carries);
  }
  list(): Carries[] | null {
    return this.known.size > MOST_COMBINATIONS ? null : [...this.known.values()];
  }
}

/** Every way an excluded wheel may have carried, one count a group. */
function anyCarries(groups: readonly Reach[], into: number): Carries[] | null {
  let lists: Carries[] = [[]];
  for (const { reach, forward, backward } of groups) {
    const [from, to] = reach < into ? [0, 0] : [-backward, forward];
    if (lists.length * (to - from + 1) > MOST_COMBINATIONS) return null;
    const counts = Array.from({ length: to - from + 1 }, (_, index) => from + index);
    lists = lists.flatMap((list) => counts.map((count) => [...list, count]));
  }
  return lists;
}

/** Runs one wheel from one digit with one list of carries; adds what it passes on and returns where it stops. */
function runWheel(groups: readonly Reach[], wheel: number, digit: number, carries: Carries, out: number[]): number {
  let sum = digit;
  let passed = 0;
  groups.forEach(({ net, reach }, index) => {
    sum += (net[wheel] ?? 0) + (carries[index] ?? 0);
    const passes = Math.floor(sum / 10);
    out.push(reach > wheel ? passes - passed : 0);
    passed = passes;
  });
  return modulo(sum);
}

function byCombination(track: Track, groups: readonly Reach[], excluded: ReadonlySet<number>): DigitSet[] {
  const none: Carries = groups.map(() => 0);
  const possible: DigitSet[] = [];
  let carries: Carries[] | null = [none];
  for (let wheel = 0; wheel < track.wheels; wheel += 1) {
    if (wheel > track.mostReach) carries = [none];
    if (!carries) {
      possible.push(ANY_DIGIT);
      continue;
    }
    const next = new Combinations();
    let digits = 0;
    for (const digit of track.sets[wheel] ?? [])
      for (const list of carries) {
        const out: number[] = [];
        digits |= 1 << runWheel(groups, wheel, digit, list, out);
        next.add(out);
      }
    possible.push(digits);
    const overRound = excluded.has(wheel) && (track.rounds[wheel + 1] ?? 0) > 0;
    carries = overRound ? null : excluded.has(wheel) ? anyCarries(groups, wheel + 1) : next.list();
  }
  return possible;
}

/**
 * The digits possible on a healthy machine at the end of a track, wheel 1 first. Exact, but for a track whose
 * carries changed their reach more often than can be followed, or where an excluded wheel stands right below one
 * that is driven a full round: there a wheel may be given digits too many, never too few.
 * `excluded` holds wheel indexes, 0 = wheel 1.
 */
export function possibleDigits(track: Track, excluded: ReadonlySet<number>): DigitSet[] {
  if (track.leastReach >= track.mostReach || !track.stretches) return byRange(track, excluded);
  return byCombination(track, byReach(track.stretches, track.wheels), excluded);
}

/** The digit of a set of one, else null. */
export function onlyDigit(set: DigitSet): number | null {
  return set !== 0 && (set & (set - 1)) === 0 ? 31 - Math.clz32(set) : null;
}
