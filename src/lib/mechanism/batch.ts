import type { Drive } from './drive';
import type { FaultTable } from './fault-table';
import type { CounterTurn, TurnMarks } from './turn';

/**
 * Many equal turns at once, by counting instead of turning. A wheel that makes at most ten steps a turn passes
 * 9→0 at most once a turn, so after t turns it has passed floor((digit + steps) / 10) times, and that many times
 * it has raised the next lever; one that makes more passes every turn: every wheel follows from the one below it, at any t, without the turns between.
 * All counts stay far below 2^53; no register is ever one number.
 */
interface Wheel {
  /** Steps from the numeral before the carry: the digit forward, its nines' complement backward. */
  readonly start: number;
  /** Steps a turn without a carry. */
  readonly steps: number;
  readonly seized: boolean;
  /** Whether a pass of the wheel below raises this lever at all. */
  readonly reached: boolean;
  readonly missed: boolean;
  /** The turn in which a held lever is first up; Infinity = never, null = the lever drops every turn. */
  heldSince: number | null;
}

function wheelAt(index: number, digits: Uint8Array, drive: Drive, table: FaultTable | null): Wheel {
  const digit = digits[index] ?? 0;
  const amount = drive.amounts[index] ?? 0;
  const slip = amount > 0 && table ? (table.over[index] ?? 0) - (table.short[index] ?? 0) : 0;
  return {
    start: drive.backward ? 9 - digit : digit,
    steps: amount + slip,
    seized: (table?.seized[index] ?? 0) > 0,
    reached: index > 0 && index <= drive.reach,
    missed: (table?.missed[index] ?? 0) > 0,
    heldSince: null,
  };
}

/** How often wheel `last` has been moved by its lever after `turns`, and how often it has passed its edge. */
function countTo(wheels: readonly Wheel[], last: number, turns: number): { carries: number; passes: number } {
  let passes = 0;
  let carries = 0;
  for (let index = 0; index <= last; index += 1) {
    const wheel = wheels[index] as Wheel;
    if (wheel.missed) carries = 0;
    else if (wheel.heldSince !== null) carries = Math.max(0, turns - wheel.heldSince + 1);
    else carries = wheel.reached ? passes : 0;
    passes = wheel.seized ? 0 : passesOf(wheel, turns, carries);
  }
  return { carries, passes };
}

/** A wheel driven a full round or more passes its edge every turn, and raises the lever once for it. */
function passesOf(wheel: Wheel, turns: number, carries: number): number {
  return wheel.steps >= 10 ? turns : Math.floor((wheel.start + wheel.steps * turns + carries) / 10);
}

/** The first turn, up to `turns`, in which the wheel below passes its edge; Infinity when it does not. */
function firstPass(wheels: readonly Wheel[], below: number, turns: number): number {
  if (countTo(wheels, below, turns).passes === 0) return Number.POSITIVE_INFINITY;
  let [from, to] = [1, turns];
  while (from < to) {
    const middle = Math.floor((from + to) / 2);
    if (countTo(wheels, below, middle).passes > 0) to = middle;
    else from = middle + 1;
  }
  return from;
}

/** Moves the result register by `turns` equal turns of a machine whose faults, if any, always act. */
export function spinResult(
  digits: Uint8Array,
  drive: Drive,
  marks: TurnMarks,
  turns: number,
  table: FaultTable | null,
): void {
  const wheels: Wheel[] = [];
  const after: number[] = [];
  let levers = 0;
  let passes = 0;
  for (let index = 0; index < digits.length; index += 1) {
    const wheel = wheelAt(index, digits, drive, table);
    wheels.push(wheel);
    if ((table?.held[index] ?? 0) > 0 && !wheel.missed) {
      const raised = wheel.reached ? firstPass(wheels, index - 1, turns) : Number.POSITIVE_INFINITY;
      wheel.heldSince = (marks.levers & (1 << index)) !== 0 ? 1 : raised;
      if (wheel.heldSince <= turns) levers |= 1 << index;
    }
    const count = countTo(wheels, index, turns);
    const moved = wheel.seized ? 0 : wheel.steps * turns + count.carries;
    const stop = (wheel.start + moved) % 10;
    after.push(drive.backward ? 9 - stop : stop);
    passes = count.passes;
  }
  digits.set(after);
  marks.levers = levers;
  marks.overflow = passes > 0;
}

/** Moves the counter by `turns` equal turns of a machine whose faults, if any, always act. */
export function spinCounter(digits: Uint8Array, turn: CounterTurn, turns: number, table: FaultTable | null): void {
  let steps = (table?.counterMissed[turn.wheel] ?? 0) > 0 ? 0 : turns;
  for (let wheel = turn.wheel; wheel < digits.length && steps > 0; wheel += 1) {
    const digit = digits[wheel] ?? 0;
    const stop = (turn.backward ? 9 - digit : digit) + steps;
    digits[wheel] = turn.backward ? 9 - (stop % 10) : stop % 10;
    const passes = Math.floor(stop / 10);
    steps = turn.carries && !((table?.counterCarryMissed[wheel + 1] ?? 0) > 0) ? passes : 0;
  }
}
