import { compare } from '@/lib/comparison/compare';
import { type Fault, faultDictionary } from '@/lib/mechanism/faults';
import { acceptLayout, type Layout, type LayoutDescription } from '@/lib/mechanism/layout';
import { createMachine } from '@/lib/mechanism/machine';
import type { Step } from '@/lib/mechanism/steps';

/** One figure of the benchmark, with the bound that it has to keep. */
export interface Measure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly atLeast?: number;
  readonly atMost?: number;
}

const TURNS = 200_000;
const ROUNDS = 9;

function layoutOf(description: LayoutDescription): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
  return layout.value;
}

function milliseconds(work: () => void): number {
  const from = performance.now();
  work();
  return performance.now() - from;
}

function median(values: number[]): number {
  const sorted = values.sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? Number.NaN;
}

/** Digits without a pattern that a branch predictor could learn, always the same ones. */
function mixedDigits(count: number): string {
  let state = 12_345;
  return Array.from({ length: count }, () => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return Math.floor((state / 2_147_483_648) * 10);
  }).join('');
}

/** What the results came to, so that no engine may leave the work out. */
let sink = 0n;

/**
 * How fast a healthy machine turns, every wheel and every carry known after each turn, as a share of plain BigInt
 * adding and reducing, which knows neither. Both in the same run, by turns, so that the computer cancels out.
 */
function healthyTurns(wheels: number): Measure {
  const slides = mixedDigits(Math.min(32, wheels - 4));
  const layout = layoutOf({ settingSlides: slides.length, resultWheels: wheels, counterWheels: 0 });
  const machine = createMachine(layout);
  machine.apply({ do: 'set', slides });
  const [value, modulus] = [BigInt(slides), 10n ** BigInt(wheels)];
  let register = 0n;
  const turn = (): void => {
    for (let count = 0; count < TURNS; count += 1) machine.turn('add');
    sink += BigInt(machine.carryBits >>> 0);
  };
  const add = (): void => {
    for (let count = 0; count < TURNS; count += 1) register = (register + value) % modulus;
    sink += register;
  };
  turn();
  add();
  const ratios = Array.from({ length: ROUNDS }, () => milliseconds(add) / milliseconds(turn));
  if (BigInt(machine.state.result) !== register) throw new Error('machine and BigInt differ');
  const atLeast = wheels < 20 ? 0.2 : 0.5;
  return { name: `healthy turns, ${wheels} wheels, against BigInt`, value: median(ratios), unit: '×', atLeast };
}

const RUNNING = { settingSlides: 11, resultWheels: 15, counterWheels: 8, carriagePositions: 8 };

const FAULTY: { name: string; faults: Fault[] }[] = [
  { name: 'one fault', faults: [{ kind: 'carry-missed', wheel: 5 }] },
  {
    name: 'intermittent faults',
    faults: [
      { kind: 'carry-missed', wheel: 5, rate: 0.35 },
      { kind: 'carry-held', wheel: 8, rate: 0.5 },
      { kind: 'wheel-short', wheel: 3, rate: 0.1 },
      { kind: 'slide-off', slide: 2, by: 1, rate: 0.2 },
      { kind: 'tooth-short', tooth: 4, drum: 'add', rate: 0.35 },
      { kind: 'counter-missed', wheel: 1, rate: 0.5 },
    ],
  },
  {
    name: 'twenty intermittent faults of all kinds',
    faults: faultDictionary(layoutOf(RUNNING))
      .filter((_, index) => index % 14 === 0)
      .map((fault) => ({ ...fault, rate: 0.35 })),
  },
];

function faultyTurns(name: string, faults: Fault[]): Measure {
  const layout = layoutOf(RUNNING);
  const machine = createMachine(layout, { faults, seed: 1 });
  machine.apply({ do: 'set', slides: mixedDigits(11) });
  const spent = milliseconds(() => {
    machine.apply({ do: 'turn', way: 'add', times: 1_000_000 });
  });
  return { name: `a million turns with ${name}, 15 wheels`, value: spent, unit: 'ms', atMost: 1_000 };
}

function comparison(name: string, wheels: number, glyph: string | null, readEvery: number): Measure {
  const layout = layoutOf({ settingSlides: 8, resultWheels: wheels, counterWheels: 8, carriagePositions: 8 });
  const machine = createMachine(layout);
  const steps: Step[] = Array.from({ length: 10_000 }, (_, index): Step => {
    const operation: Step =
      index % 10 === 0
        ? { do: 'set', slides: mixedDigits(8 + (index % 7)).slice(-8) }
        : { do: 'turn', way: index % 3 === 0 ? 'subtract' : 'add', times: (index % 9) + 1 };
    const { result, counter } = machine.apply(operation);
    if ((index + 1) % readEvery !== 0) return operation;
    return { ...operation, read: { result: glyph ? glyph.repeat(wheels) : result, counter } };
  });
  let agrees = false;
  const spent = milliseconds(() => {
    agrees = compare({ layout, steps }).agrees;
  });
  if (!agrees) throw new Error('a healthy run must agree');
  return { name: `comparing 10,000 steps, ${name}`, value: spent, unit: 'ms', atMost: 2_000 };
}

/** Measures the simulator and the comparison; every figure is the median or the one run of a fixed piece of work. */
export async function benchCore(): Promise<Measure[]> {
  const measures = [
    healthyTurns(15),
    healthyTurns(24),
    ...FAULTY.map(({ name, faults }) => faultyTurns(name, faults)),
    comparison('15 wheels, every step read', 15, null, 1),
    comparison('32 unread wheels, every step read', 32, '?', 1),
    comparison('32 unread wheels, read at the end only', 32, '?', 10_000),
  ];
  // Never true: it only makes the sums be needed.
  if (sink < 0n) throw new Error('sums are not negative');
  return measures;
}
