import type { Drive } from './drive';
import type { FaultTable } from './fault-table';
import type { Chance } from './random';

/**
 * What a turn leaves besides the digits. Wheels stand as bits, bit 0 = wheel 1: 32 wheels are the most a layout
 * may have. `made` are the wheels that received a carry.
 */
export interface TurnMarks {
  made: number;
  overflow: boolean;
  /** Levers still up when the turn ends; only a held one can be. */
  levers: number;
}

/** One turn of a healthy machine, wheel by wheel from the lowest. */
export function turnHealthy(digits: Uint8Array, drive: Drive, marks: TurnMarks): void {
  const { amounts, reach, backward } = drive;
  const wheels = digits.length;
  let made = 0;
  let lever = 0;
  let wheel = drive.from;
  for (; wheel < wheels; wheel += 1) {
    if (lever !== 0 && wheel > reach) lever = 0;
    if (lever !== 0) made |= 1 << wheel;
    const motion = (amounts[wheel] as number) + lever;
    if (backward) {
      const left = (digits[wheel] as number) - motion;
      lever = left < 0 ? 1 : 0;
      digits[wheel] = left + lever * 10;
    } else {
      const sum = (digits[wheel] as number) + motion;
      lever = sum > 9 ? 1 : 0;
      digits[wheel] = sum - lever * 10;
    }
  }
  marks.made = made;
  marks.overflow = lever !== 0;
  marks.levers = 0;
}

/** Steps that a driven wheel goes too far or too little, which only a driven one can. */
function slip(wheel: number, table: FaultTable, chance: Chance): number {
  const short = chance.happens(table.short[wheel] as number) ? -1 : 0;
  return chance.happens(table.over[wheel] as number) ? short + 1 : short;
}

/**
 * One turn with faults. The lever of a wheel goes up when the wheel below passes 9→0 (0→9 backward), is dropped
 * by a missed carry, and stays up after the turn with the chance of a held one.
 */
export function turnFaulty(
  digits: Uint8Array,
  drive: Drive,
  marks: TurnMarks,
  table: FaultTable,
  chance: Chance,
): void {
  const { amounts, reach, backward } = drive;
  const wheels = digits.length;
  let levers = marks.levers;
  let made = 0;
  let passed = false;
  for (let wheel = 0; wheel < wheels; wheel += 1) {
    const bit = 1 << wheel;
    if (passed && wheel <= reach) levers |= bit;
    if ((levers & bit) !== 0 && chance.happens(table.missed[wheel] as number)) levers &= ~bit;
    const up = (levers & bit) !== 0;
    const amount = amounts[wheel] as number;
    passed = false;
    if ((amount > 0 || up) && !chance.happens(table.seized[wheel] as number)) {
      if (up) made |= bit;
      const motion = amount + (up ? 1 : 0) + (amount > 0 ? slip(wheel, table, chance) : 0);
      const at = digits[wheel] as number;
      const stop = backward ? at - motion : at + motion;
      passed = stop < 0 || stop > 9;
      digits[wheel] = (stop + 20) % 10;
    }
    if (up && !chance.happens(table.held[wheel] as number)) levers &= ~bit;
  }
  marks.made = made;
  marks.overflow = passed;
  marks.levers = levers;
}

/** What the driven counter wheel does in a turn. */
export interface CounterTurn {
  readonly wheel: number;
  readonly backward: boolean;
  readonly carries: boolean;
}

/** Moves the counter by one step, or not at all. */
export function turnCounter(digits: Uint8Array, turn: CounterTurn, table: FaultTable | null, chance: Chance): void {
  const by = turn.backward ? 9 : 1;
  const edge = turn.backward ? 0 : 9;
  let wheel = turn.wheel;
  if (wheel >= digits.length || (table && chance.happens(table.counterMissed[wheel] as number))) return;
  for (;;) {
    const at = digits[wheel] as number;
    digits[wheel] = (at + by) % 10;
    wheel += 1;
    if (at !== edge || !turn.carries || wheel >= digits.length) return;
    if (table && chance.happens(table.counterCarryMissed[wheel] as number)) return;
  }
}
