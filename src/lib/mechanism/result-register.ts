import { spinResult } from './batch';
import type { Drive } from './drive';
import type { FaultTable } from './fault-table';
import { createPacked, type Packed, pack, packedCarries, setDrive, turnPacked, unpack } from './packed';
import type { Chance } from './random';
import { type TurnMarks, turnFaulty, turnHealthy } from './turn';

/** Turns with one setting after which packing pays. */
const WORTH_PACKING = 3;

/** The result register with its ways of turning: by wheels, by counting, or packed for many healthy turns in a row. */
export class ResultRegister {
  private readonly packed: Packed | null;
  private readonly marks: TurnMarks = { made: 0, overflow: false, levers: 0 };
  /** Which of the two forms tells how the wheels stand; `both` when they agree. */
  private standing: 'wheels' | 'packed' | 'both' = 'wheels';
  private turnsAlike = 0;
  private carriesPacked = false;

  constructor(
    private readonly wheels: Uint8Array,
    private readonly drive: Drive,
    private readonly faults: { readonly table: FaultTable; readonly chance: Chance } | null,
    reachesAll: boolean,
  ) {
    this.packed = faults === null && reachesAll ? createPacked(wheels.length) : null;
  }

  /** The wheels, wheel 1 first. Whoever moves one says so with `moved`. */
  get digits(): Uint8Array {
    if (this.standing === 'packed' && this.packed) {
      unpack(this.packed, this.wheels);
      this.standing = 'both';
    }
    return this.wheels;
  }

  /** Wheels that received a carry in the last turn, as bits, bit 0 = wheel 1. */
  get carries(): number {
    return this.packed && this.carriesPacked ? packedCarries(this.packed) : this.marks.made;
  }

  /** Whether a carry left the highest wheel, in the last turn or in any of those counted. */
  get overflow(): boolean {
    return this.marks.overflow;
  }

  /** Something else than a turn is being done: no wheel has received a carry in it. */
  forgetCarries(): void {
    this.marks.made = 0;
    this.carriesPacked = false;
  }

  /** The wheels have been moved by something else than a turn. */
  moved(): Uint8Array {
    const wheels = this.digits;
    this.standing = 'wheels';
    return wheels;
  }

  /** The drive is about to be worked out anew. */
  redriven(): void {
    this.moved();
    this.turnsAlike = 0;
  }

  turn(): void {
    this.carriesPacked = false;
    if (this.faults) turnFaulty(this.wheels, this.drive, this.marks, this.faults.table, this.faults.chance);
    else if (this.packed && this.turnsAlike >= WORTH_PACKING) this.turnPacked(this.packed);
    else {
      turnHealthy(this.wheels, this.drive, this.marks);
      this.turnsAlike += 1;
    }
  }

  /** Makes equal turns by counting. Only for faults that always act. */
  spin(turns: number): void {
    spinResult(this.moved(), this.drive, this.marks, turns, this.faults?.table ?? null);
  }

  private turnPacked(packed: Packed): void {
    if (this.standing === 'wheels') {
      setDrive(packed, this.drive);
      pack(packed, this.wheels);
    }
    this.marks.overflow = turnPacked(packed);
    this.standing = 'packed';
    this.carriesPacked = true;
  }
}
