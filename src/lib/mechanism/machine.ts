import { spinCounter } from './batch';
import { createDrive, driveFaulty, driveHealthy } from './drive';
import { tableOf } from './fault-table';
import type { Fault } from './faults';
import type { Layout } from './layout';
import { type Chance, chanceFromSeed } from './random';
import { readDigits, writeDigits } from './registers';
import { createResultRegister } from './result-register';
import type { Clearable, Operation, Register, Start, Way } from './steps';
import { type CounterTurn, type TurnMarks, turnCounter } from './turn';

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

/** A machine with its faults, if any, as it stands before the first operation: slides at zero, carriage at 1. */
export function createMachine(layout: Layout, options: MachineOptions = {}): Machine {
  const counter = acceptedDigits(options.start?.counter, layout.counterWheels);
  const table = options.faults && options.faults.length > 0 ? tableOf(layout, options.faults) : null;
  const chance: Chance = chanceFromSeed(options.seed ?? 0);
  const slides = new Uint8Array(layout.settingSlides);
  const drive = createDrive(layout);
  const marks: TurnMarks = { made: 0, overflow: false, levers: 0 };
  const result = createResultRegister(
    acceptedDigits(options.start?.result, layout.resultWheels),
    drive,
    marks,
    table && { table, chance },
    layout.resultCarry === null,
  );
  let carriage = 1;
  let reversed = false;
  /** The way the drive was last worked out for; null when slides or carriage have moved since. */
  let driven: Way | null = null;
  let overflow = false;

  const prepare = (way: Way): void => {
    if (driven === way && !table?.randomDrive) return;
    if (way === 'subtract' && layout.subtraction === 'none') throw new Error('This layout does not subtract');
    result.redriven();
    if (table) driveFaulty(drive, layout, slides, carriage, way, table, chance);
    else driveHealthy(drive, layout, slides, carriage, way);
    driven = way;
  };

  const counting = (way: Way): CounterTurn => {
    const lever = reversed && !(table && chance.happens(table.reverseDead));
    const inverted = table !== null && chance.happens(table.counterInverted);
    const backward = ((way === 'subtract') !== lever) !== inverted;
    return { wheel: carriage - 1, backward, carries: layout.counterCarry };
  };

  const turn = (way: Way): void => {
    prepare(way);
    result.turn();
    if (counter.length > 0) turnCounter(counter, counting(way), table, chance);
    overflow = marks.overflow;
  };

  const turnMany = (way: Way, times: number): void => {
    let left = times;
    let ever = false;
    if (times >= FEW_TURNS && !table?.random) {
      prepare(way);
      // The last turn is made, not counted: it tells which wheels received a carry.
      result.spin(times - 1);
      spinCounter(counter, counting(way), times - 1, table);
      ever = marks.overflow;
      left = 1;
    }
    for (; left > 0; left -= 1) {
      turn(way);
      ever ||= overflow;
    }
    overflow = ever;
  };

  const clearWheels = (register: Register, digits: Uint8Array): void => {
    for (let wheel = 0; wheel < digits.length; wheel += 1) {
      const stays = table !== null && digits[wheel] !== 0 && chance.happens(table.clear[register][wheel] ?? 0);
      if (!stays) digits[wheel] = 0;
    }
  };

  const clear = (what: Clearable): void => {
    if (what !== 'counter') {
      clearWheels('result', result.digits);
      result.moved();
    }
    if (what !== 'result') clearWheels('counter', counter);
  };

  const advance = (operation: Operation): void => {
    result.forgetCarries();
    overflow = false;
    switch (operation.do) {
      case 'set':
        slides.set(acceptedDigits(operation.slides, slides.length));
        driven = null;
        break;
      case 'turn':
        turnMany(operation.way, operation.times ?? 1);
        break;
      case 'shift':
        carriage = operation.to;
        driven = null;
        break;
      case 'reverse':
        reversed = operation.on;
        break;
      case 'clear':
        clear(operation.what);
        break;
    }
  };

  const state = (): MachineState => ({
    result: writeDigits(result.digits),
    counter: writeDigits(counter),
    slides: writeDigits(slides),
    carriage,
    reversed,
    overflow,
    carries: wheelsOf(result.carries),
  });

  return {
    apply: (operation) => {
      advance(operation);
      return state();
    },
    advance,
    turn,
    get carryBits() {
      return result.carries;
    },
    get state() {
      return state();
    },
    get carriage() {
      return carriage;
    },
    get reversed() {
      return reversed;
    },
    get result() {
      return result.digits;
    },
    counter,
    slides,
  };
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
