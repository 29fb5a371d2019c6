import { spinResult } from './batch';
import type { Drive } from './drive';
import type { FaultTable } from './fault-table';
import { createPacked, pack, packedCarries, setDrive, turnPacked, unpack } from './packed';
import type { Chance } from './random';
import { type TurnMarks, turnFaulty, turnHealthy } from './turn';

/** The result register with its way of turning: by wheels, by counting, or packed for many healthy turns in a row. */
export interface ResultRegister {
  /** The wheels, wheel 1 first. Whoever moves one says so with `moved`. */
  readonly digits: Uint8Array;
  /** The wheels have been moved by something else than a turn. */
  moved(): void;
  /** Wheels that received a carry in the last turn, as bits, bit 0 = wheel 1. */
  readonly carries: number;
  /** Something else than a turn is being done: no wheel has received a carry in it. */
  forgetCarries(): void;
  /** The drive is about to be worked out anew, or has its old values again. */
  redriven(): void;
  turn(): void;
  /** Makes equal turns by counting. Only for faults that always act. */
  spin(turns: number): void;
}

/** Turns with one setting after which packing pays. */
const WORTH_PACKING = 3;

export function createResultRegister(
  digits: Uint8Array,
  drive: Drive,
  marks: TurnMarks,
  faults: { readonly table: FaultTable; readonly chance: Chance } | null,
  reachesAll: boolean,
): ResultRegister {
  const packed = faults === null && reachesAll ? createPacked(digits.length) : null;
  /** Which of the two forms tells how the wheels stand; `both` when they agree. */
  let standing: 'digits' | 'packed' | 'both' = 'digits';
  let turnsAlike = 0;
  let carriesPacked = false;

  const settle = (): void => {
    if (standing !== 'packed' || !packed) return;
    unpack(packed, digits);
    standing = 'both';
  };

  const turnPackedNow = (into: NonNullable<typeof packed>): void => {
    if (standing === 'digits') {
      setDrive(into, drive);
      pack(into, digits);
    }
    marks.overflow = turnPacked(into);
    standing = 'packed';
    carriesPacked = true;
  };

  return {
    get digits() {
      settle();
      return digits;
    },
    get carries() {
      return packed && carriesPacked ? packedCarries(packed) : marks.made;
    },
    forgetCarries: () => {
      marks.made = 0;
      carriesPacked = false;
    },
    moved: () => {
      settle();
      standing = 'digits';
    },
    redriven: () => {
      settle();
      standing = 'digits';
      turnsAlike = 0;
    },
    turn: () => {
      carriesPacked = false;
      if (faults) turnFaulty(digits, drive, marks, faults.table, faults.chance);
      else if (packed && turnsAlike >= WORTH_PACKING) turnPackedNow(packed);
      else {
        turnHealthy(digits, drive, marks);
        turnsAlike += 1;
      }
    },
    spin: (turns) => {
      settle();
      standing = 'digits';
      spinResult(digits, drive, marks, turns, faults?.table ?? null);
    },
  };
}
