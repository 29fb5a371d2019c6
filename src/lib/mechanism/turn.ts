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

/** One turn of a healthy machine, wheel by wheel from the lowest that is driven. */
export function turnHealthy(digits: Uint8Array, drive: Drive, marks: TurnMarks): void {
  const { amounts, reach, backward } = drive;
  let made = 0;
  let lever = 0;
  for (let wheel = drive.from; wheel < digits.length; wheel += 1) {
    if (wheel > reach) lever = 0;
    made |= lever << wheel;
    const motion = (amounts[wheel] as number) + lever;
    const stop = (digits[wheel] as number) + (backward ? -motion : motion);
    lever = stop < 0 || stop > 9 ? 1 : 0;
    digits[wheel] = (stop + 10) % 10;
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
    const amount = amounts[wheel] as number;
    const sound = (table.touched & bit) === 0;
    if (passed && wheel <= reach) levers |= bit;
    if (!sound && (levers & bit) !== 0 && chance.happens(table.missed[wheel] as number)) levers &= ~bit;
    const up = (levers & bit) !== 0;
    passed = false;
    if ((amount > 0 || up) && (sound || !chance.happens(table.seized[wheel] as number))) {
      if (up) made |= bit;
      const slipped = sound || amount === 0 ? 0 : slip(wheel, table, chance);
      const motion = amount + (up ? 1 : 0) + slipped;
      const stop = (digits[wheel] as number) + (backward ? -motion : motion);
      passed = stop < 0 || stop > 9;
      digits[wheel] = (stop + 20) % 10;
    }
    if (up && (sound || !chance.happens(table.held[wheel] as number))) levers &= ~bit;
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
