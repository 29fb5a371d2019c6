import { spinCounter } from './batch';
import { createDrive, type Drive, driveFaulty, driveHealthy } from './drive';
import { type FaultTable, tableOf } from './fault-table';
import type { Fault } from './faults';
import type { Layout } from './layout';
import { type Chance, chanceFromSeed } from './random';
import { readDigits, writeDigits } from './registers';
import { ResultRegister } from './result-register';
import type { Clearable, Operation, Register, Start, Way } from './steps';
import { type CounterTurn, turnCounter } from './turn';

/** How a machine stands after an operation. Registers and slides are written highest first. */
export interface MachineState {
  readonly result: string;
  readonly counter: string;
  readonly slides: string;
  /** 1 = the rightmost place. */
  readonly carriage: number;
  /** How the reversing lever stands, whether or not it does anything. */
  readonly reversed: boolean;
  /** Whether any turn of the operation carried out of the highest result wheel. */
  readonly overflow: boolean;
  /** Result wheels that received a carry in the operation's last turn, rising; 1 = units. */
  readonly carries: readonly number[];
}

export interface MachineOptions {
  readonly start?: Start | undefined;
  readonly faults?: readonly Fault[] | undefined;
  /** Needed when a fault acts only sometimes; a run without one is seeded with 0. */
  readonly seed?: number | undefined;
}

/** A machine under the hand. Everything given to it must have passed the doors of `accept.ts`. */
export interface Machine {
  /** Does one operation and tells how the machine stands after it. */
  apply(operation: Operation): MachineState;
  /** Does one operation without writing the state out. */
  advance(operation: Operation): void;
  /** One crank turn. */
  turn(way: Way): void;
  /** Result wheels that received a carry in the last turn, as bits, bit 0 = wheel 1. */
  readonly carryBits: number;
  /** How the machine stands now. */
  readonly state: MachineState;
  /** The wheels themselves, wheel 1 first: to look at, not to move. */
  readonly result: Readonly<Uint8Array>;
  readonly counter: Readonly<Uint8Array>;
  readonly slides: Readonly<Uint8Array>;
  readonly carriage: number;
  readonly reversed: boolean;
}

/** Below this many turns it is quicker to make them than to count them. */
const FEW_TURNS = 4;

/** Digits of something that a door has let through already; anything else is our own mistake. */
export function acceptedDigits(text: string | undefined, places: number): Uint8Array {
  if (text === undefined) return new Uint8Array(places);
  const read = readDigits(text, places);
  if (!read.ok) throw new Error(`Not accepted before use: ${text}`);
  return read.value;
}

function wheelsOf(bits: number): number[] {
  const wheels: number[] = [];
  for (let wheel = 0; wheel < 32; wheel += 1) if ((bits & (1 << wheel)) !== 0) wheels.push(wheel + 1);
  return wheels;
}

class WorkingMachine implements Machine {
  readonly counter: Uint8Array;
  readonly slides: Uint8Array;
  carriage = 1;
  reversed = false;
  private readonly table: FaultTable | null;
  private readonly chance: Chance;
  private readonly drive: Drive;
  private readonly register: ResultRegister;
  /** The way the drive was last worked out for; null when slides or carriage have moved since. */
  private driven: Way | null = null;
  private overflow = false;

  constructor(
    private readonly layout: Layout,
    options: MachineOptions,
  ) {
    const { start, faults = [], seed = 0 } = options;
    this.table = faults.length > 0 ? tableOf(layout, faults) : null;
    this.chance = chanceFromSeed(seed);
    this.drive = createDrive(layout);
    this.slides = new Uint8Array(layout.settingSlides);
    this.counter = acceptedDigits(start?.counter, layout.counterWheels);
    const result = acceptedDigits(start?.result, layout.resultWheels);
    const ailing = this.table && { table: this.table, chance: this.chance };
    this.register = new ResultRegister(result, this.drive, ailing, layout.resultCarry === null);
  }

  get result(): Readonly<Uint8Array> {
    return this.register.digits;
  }

  get carryBits(): number {
    return this.register.carries;
  }

  get state(): MachineState {
    return {
      result: writeDigits(this.register.digits),
      counter: writeDigits(this.counter),
      slides: writeDigits(this.slides),
      carriage: this.carriage,
      reversed: this.reversed,
      overflow: this.overflow,
      carries: wheelsOf(this.register.carries),
    };
  }

  apply(operation: Operation): MachineState {
    this.advance(operation);
    return this.state;
  }

  advance(operation: Operation): void {
    this.register.forgetCarries();
    this.overflow = false;
    switch (operation.do) {
      case 'set':
        this.slides.set(acceptedDigits(operation.slides, this.slides.length));
        this.driven = null;
        break;
      case 'turn':
        this.turnMany(operation.way, operation.times ?? 1);
        break;
      case 'shift':
        this.carriage = operation.to;
        this.driven = null;
        break;
      case 'reverse':
        this.reversed = operation.on;
        break;
      case 'clear':
        this.clear(operation.what);
        break;
    }
  }

  turn(way: Way): void {
    this.prepare(way);
    this.register.turn();
    if (this.counter.length > 0) turnCounter(this.counter, this.counting(way), this.table, this.chance);
    this.overflow = this.register.overflow;
  }

  private turnMany(way: Way, times: number): void {
    let left = times;
    let ever = false;
    if (times >= FEW_TURNS && !this.table?.random) {
      this.prepare(way);
      // The last turn is made, not counted: it tells which wheels received a carry.
      this.register.spin(times - 1);
      spinCounter(this.counter, this.counting(way), times - 1, this.table);
      ever = this.register.overflow;
      left = 1;
    }
    for (; left > 0; left -= 1) {
      this.turn(way);
      ever ||= this.overflow;
    }
    this.overflow = ever;
  }

  /** Works the drive of the coming turn out, unless it is the last one's. */
  private prepare(way: Way): void {
    const { layout, table } = this;
    if (this.driven === way && !table?.randomDrive) return;
    if (way === 'subtract' && layout.subtraction === 'none') throw new Error('This layout does not subtract');
    this.register.redriven();
    if (table) driveFaulty(this.drive, layout, this.slides, this.carriage, way, table, this.chance);
    else driveHealthy(this.drive, layout, this.slides, this.carriage, way);
    this.driven = way;
  }

  private counting(way: Way): CounterTurn {
    const { table, chance } = this;
    const lever = this.reversed && !(table && chance.happens(table.reverseDead));
    const inverted = table !== null && chance.happens(table.counterInverted);
    const backward = ((way === 'subtract') !== lever) !== inverted;
    return { wheel: this.carriage - 1, backward, carries: this.layout.counterCarry };
  }

  private clear(what: Clearable): void {
    if (what !== 'counter') {
      this.clearWheels('result', this.register.digits);
      this.register.moved();
    }
    if (what !== 'result') this.clearWheels('counter', this.counter);
  }

  private clearWheels(register: Register, digits: Uint8Array): void {
    const { table, chance } = this;
    for (let wheel = 0; wheel < digits.length; wheel += 1) {
      const stays = table !== null && digits[wheel] !== 0 && chance.happens(table.clear[register][wheel] ?? 0);
      if (!stays) digits[wheel] = 0;
    }
  }
}

/** A machine with its faults, if any, as it stands before the first operation: slides at zero, carriage at 1. */
export function createMachine(layout: Layout, options: MachineOptions = {}): Machine {
  return new WorkingMachine(layout, options);
}

export interface SimulationInput extends MachineOptions {
  readonly layout: Layout;
  readonly steps: readonly Operation[];
}

/** Runs accepted steps from the start; one state a step. */
export function simulate(input: SimulationInput): MachineState[] {
  const machine = createMachine(input.layout, input);
  return input.steps.map((step) => machine.apply(step));
}
