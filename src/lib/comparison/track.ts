import { digitsOf } from '../mechanism/registers';

/** Turns in a row that go the same way and whose carries reach the same wheel. */
export interface Stretch {
  readonly backward: boolean;
  /** Index of the highest wheel that a carry still reaches. */
  readonly reach: number;
  turns: number;
  /** Steps that each wheel was driven in all, in the direction of the turns: never negative. */
  readonly moves: Float64Array;
}

/**
 * What a register has been through since it was last read or cleared, and what it showed then. It grows with the
 * changes of direction and reach, not with the turns, and no further than `MOST_STRETCHES`.
 */
export interface Track {
  readonly wheels: number;
  /** Digits possible at the outset, rising, wheel 1 first: none doubted, two for a wheel between, ten for unread. */
  sets: readonly (readonly number[])[];
  /** Whether the outset is a clearing: then the zeros are what should stand there, not what was seen. */
  cleared: boolean;
  /** Null when there were too many to keep. */
  stretches: Stretch[] | null;
  /** Net steps driven, forward less backward. */
  net: Float64Array;
  /** Turns in which a wheel was driven a full round of ten, as complement steps drive the lowest wheel. */
  rounds: Float64Array;
  forward: number;
  backward: number;
  leastReach: number;
  mostReach: number;
}

/** More changes of direction than anybody makes between two readings. */
export const MOST_STRETCHES = 64;

const ZERO = [0] as const;
const ANY = digitsOf('?');

export function createTrack(digits: Readonly<Uint8Array>): Track {
  return {
    wheels: digits.length,
    sets: Array.from(digits, (digit) => [digit]),
    cleared: false,
    stretches: [],
    net: new Float64Array(digits.length),
    rounds: new Float64Array(digits.length),
    forward: 0,
    backward: 0,
    leastReach: Number.POSITIVE_INFINITY,
    mostReach: -1,
  };
}

function restart(track: Track, cleared: boolean): void {
  track.cleared = cleared;
  track.stretches = [];
  track.net.fill(0);
  track.rounds.fill(0);
  track.forward = 0;
  track.backward = 0;
  track.leastReach = Number.POSITIVE_INFINITY;
  track.mostReach = -1;
}

/** The register now shows these glyphs, wheel 1 first; null = nobody looked. */
export function restartRead(track: Track, glyphs: readonly string[] | null): void {
  track.sets = glyphs ? glyphs.map(digitsOf) : Array.from({ length: track.wheels }, () => ANY);
  restart(track, false);
}

/** The register has been cleared. */
export function restartCleared(track: Track): void {
  track.sets = Array.from({ length: track.wheels }, () => ZERO);
  restart(track, true);
}

function stretchFor(track: Track, backward: boolean, reach: number): Stretch | null {
  const last = track.stretches?.at(-1);
  if (last && last.backward === backward && last.reach === reach) return last;
  if (!track.stretches || track.stretches.length === MOST_STRETCHES) {
    track.stretches = null;
    return null;
  }
  const stretch = { backward, reach, turns: 0, moves: new Float64Array(track.wheels) };
  track.stretches.push(stretch);
  return stretch;
}

/** Adds equal turns. `amounts` are the steps each wheel is driven in one turn, from wheel index `from` up. */
export function addTurns(
  track: Track,
  amounts: ArrayLike<number>,
  from: number,
  backward: boolean,
  reach: number,
  turns: number,
): void {
  const bounded = Math.min(reach, track.wheels - 1);
  const stretch = stretchFor(track, backward, bounded);
  track.leastReach = Math.min(track.leastReach, bounded);
  track.mostReach = Math.max(track.mostReach, bounded);
  if (stretch) stretch.turns += turns;
  if (backward) track.backward += turns;
  else track.forward += turns;
  for (let index = 0; index < amounts.length && from + index < track.wheels; index += 1) {
    const amount = amounts[index] ?? 0;
    const steps = amount * turns;
    const wheel = from + index;
    if (amount === 10) track.rounds[wheel] = (track.rounds[wheel] ?? 0) + turns;
    if (stretch) stretch.moves[wheel] = (stretch.moves[wheel] ?? 0) + steps;
    track.net[wheel] = (track.net[wheel] ?? 0) + (backward ? -steps : steps);
  }
}
