import type { FaultTable, SlideFault, ToothFault } from './fault-table';
import type { Layout } from './layout';
import type { Chance } from './random';
import type { Way } from './steps';

/** What one turn does to the result wheels before any carry. */
export interface Drive {
  /** Steps that each wheel is driven, wheel 1 first; never negative, whatever the direction. */
  readonly amounts: Uint8Array;
  /** Whether the wheels turn backward. */
  backward: boolean;
  /** Index of the highest wheel that a carry still reaches in this turn. */
  reach: number;
  /** Index of the lowest wheel that a column drives. */
  from: number;
}

export function createDrive(layout: Layout): Drive {
  return {
    amounts: new Uint8Array(layout.resultWheels),
    backward: false,
    reach: 0,
    from: 0,
  };
}

/** Whether a turn this way uses the complement steps of the drum. */
function isComplement(layout: Layout, way: Way): boolean {
  return way === 'subtract' && layout.subtraction === 'complement';
}

function aim(drive: Drive, layout: Layout, way: Way, from: number): void {
  drive.from = from;
  drive.backward = way === 'subtract' && layout.subtraction === 'reverse';
  drive.reach = layout.resultCarry === null ? layout.resultWheels : from + layout.resultCarry;
}

/** Columns that the drums have in this turn, from the lowest slide up. */
function columns(layout: Layout, complement: boolean): number {
  if (!complement) return layout.settingSlides;
  return layout.complementColumns ?? layout.resultWheels;
}

/** Works the drive of a healthy machine out into `drive`. `position` counts from 1, `slides` from the lowest. */
export function driveHealthy(drive: Drive, layout: Layout, slides: Uint8Array, position: number, way: Way): void {
  const from = position - 1;
  const complement = isComplement(layout, way);
  aim(drive, layout, way, from);
  drive.amounts.fill(0);
  const above = Math.min(layout.resultWheels, from + columns(layout, complement));
  for (let wheel = from; wheel < above; wheel += 1) {
    const digit = slides[wheel - from] ?? 0;
    drive.amounts[wheel] = complement ? 9 - digit : digit;
  }
  // The end-around one, which makes the nines' complement a ten's complement.
  if (complement && from < above) drive.amounts[from] = (drive.amounts[from] ?? 0) + 1;
}

function drivenAs(set: number, faults: readonly SlideFault[], chance: Chance): number {
  let digit = set;
  for (const { rate, at, by } of faults) {
    const next = at ?? Math.min(9, Math.max(0, digit + by));
    if (next !== digit && chance.happens(rate)) digit = next;
  }
  return digit;
}

function bitten(amount: number, teeth: readonly ToothFault[], chance: Chance): number {
  let left = amount;
  // From tooth 1 up, each judged on what the ones before it left over.
  for (const { tooth, rate } of teeth) if (tooth <= left && chance.happens(rate)) left -= 1;
  return left;
}

const SOUND: readonly SlideFault[] = [];

/** Like `driveHealthy`, with the faults of slides, drum and carriage, each acting as chance has it. */
export function driveFaulty(
  drive: Drive,
  layout: Layout,
  slides: Uint8Array,
  position: number,
  way: Way,
  table: FaultTable,
  chance: Chance,
): void {
  let from = position - 1;
  for (const { rate, by } of table.carriage[position - 1] ?? []) if (chance.happens(rate)) from += by;
  const complement = isComplement(layout, way);
  aim(drive, layout, way, from);
  drive.amounts.fill(0);
  const teeth = complement ? table.teeth.subtract : table.teeth.add;
  const above = Math.min(layout.resultWheels, from + columns(layout, complement));
  for (let wheel = Math.max(0, from); wheel < above; wheel += 1) {
    const column = wheel - from;
    const digit = drivenAs(slides[column] ?? 0, table.slides[column] ?? SOUND, chance);
    drive.amounts[wheel] = bitten(complement ? 9 - digit : digit, teeth, chance);
  }
  if (complement && from >= 0 && from < above) drive.amounts[from] = (drive.amounts[from] ?? 0) + 1;
}
