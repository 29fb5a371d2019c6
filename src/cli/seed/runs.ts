import type { Fault } from '@/lib/mechanism/faults';
import type { Operation } from '@/lib/mechanism/steps';
import type { DemoPerson } from './workshop';

/** What a tester does between two readings: operations, read after the last one. */
type Beat = readonly Operation[];

export interface DemoRun {
  readonly machine: string;
  readonly tester: DemoPerson;
  readonly title: string;
  readonly note?: string;
  /** When it began, UTC. */
  readonly startedAt: string;
  readonly beats: readonly Beat[];
  /** What is wrong with the invented machine during this run. */
  readonly faults?: readonly Fault[];
  readonly seed?: number;
  /** What the tester wrote down otherwise than it stood: at a beat (from 0), by a glyph at a wheel or a note. */
  readonly slips?: readonly {
    readonly beat: number;
    readonly wheel: number;
    readonly glyph: string;
  }[];
  readonly notes?: readonly { readonly beat: number; readonly text: string }[];
  readonly correction?: { readonly beat: number; readonly reason: string };
  readonly unfinished?: boolean;
}

const set = (slides: string): Operation => ({ do: 'set', slides });
const add: Operation = { do: 'turn', way: 'add', times: 1 };
const subtract: Operation = { do: 'turn', way: 'subtract', times: 1 };
const turns = (times: number): Operation => ({ do: 'turn', way: 'add', times });
const shift = (to: number): Operation => ({ do: 'shift', to });
const clear: Operation = { do: 'clear', what: 'both' };

const repeat = (count: number, beat: Beat): Beat[] => Array.from({ length: count }, () => beat);

/** Lowest slide 7, nine turns one by one. */
const SMOKE: readonly Beat[] = [[clear, set('7'), add], ...repeat(8, [add])];
/** All nines, then one more: the carry runs through every wheel. */
const RIPPLE: readonly Beat[] = [
  [clear, set('99999999'), add],
  [shift(4), set('99900000'), add],
  [shift(1), set('1'), add],
];
/** Every digit on every slide, turn by turn. */
const DIGITS: readonly Beat[] = Array.from({ length: 9 }, (_, i): Beat => [clear, set(String(i + 1).repeat(8)), add]);
/** A subtraction that borrows through the register and an addition that takes it back. */
const THERE_AND_BACK: readonly Beat[] = [
  [clear, set('305'), add],
  [set('306'), subtract],
  [add],
  [set('1'), add],
  [subtract],
];
/** Multiplication by repeated turns and shifts: 4,087 × 369. */
const PRODUCT: readonly Beat[] = [
  [clear, set('4087'), ...repeat(9, [add]).flat()],
  [shift(2), ...repeat(6, [add]).flat()],
  [shift(3), ...repeat(3, [add]).flat()],
];
const POSITIONS = (count: number): Beat[] =>
  Array.from(
    { length: count },
    (_, i): Beat => (i === 0 ? [clear, set('8'), shift(1), turns(2)] : [shift(i + 1), turns(2)]),
  );

/** A dozen sittings with different troubles, and some with none. */
export const DEMO_RUNS: readonly DemoRun[] = [
  {
    machine: 'heron',
    tester: 'tester',
    title: 'Smoke test after assembly',
    startedAt: '2026-11-10T08:05:00Z',
    beats: SMOKE,
    faults: [{ kind: 'carry-missed', wheel: 2 }],
    notes: [{ beat: 1, text: 'Crank free, but no click at the second position.' }],
  },
  {
    machine: 'heron',
    tester: 'tester',
    title: 'Smoke test, pin at 2 replaced',
    startedAt: '2026-11-10T14:20:00Z',
    beats: SMOKE,
  },
  {
    machine: 'heron',
    tester: 'tester',
    title: 'Count up, two hundred turns',
    startedAt: '2026-11-12T09:00:00Z',
    beats: [[clear, set('6'), add], ...repeat(199, [add])],
    faults: [{ kind: 'carry-missed', wheel: 3, rate: 0.35 }],
    seed: 20261112,
    note: 'Wheel 3 misses now and then, more often when the crank is turned fast.',
  },
  {
    machine: 'heron',
    tester: 'builder',
    title: 'Nines ripple',
    startedAt: '2026-11-13T10:40:00Z',
    beats: RIPPLE,
    faults: [{ kind: 'wheel-short', wheel: 5 }],
  },
  {
    machine: 'heron',
    tester: 'tester',
    title: 'Every digit on every slide',
    startedAt: '2026-11-17T08:30:00Z',
    beats: DIGITS,
    faults: [{ kind: 'tooth-short', tooth: 7, drum: 'add' }],
  },
  {
    machine: 'heron',
    tester: 'tester',
    title: 'There and back by complement',
    startedAt: '2026-11-18T13:10:00Z',
    beats: THERE_AND_BACK,
    slips: [{ beat: 2, wheel: 3, glyph: '8' }],
    correction: { beat: 2, reason: 'Misread the 3 as an 8 in the low lamp.' },
  },
  {
    machine: 'bittern',
    tester: 'tester',
    title: 'First turns',
    startedAt: '2026-11-19T09:15:00Z',
    beats: [...SMOKE, ...repeat(4, [add])],
    faults: [{ kind: 'counter-carry-missed', wheel: 2 }],
    notes: [{ beat: 0, text: 'Stiff for the first quarter, then free.' }],
  },
  {
    machine: 'bittern',
    tester: 'builder',
    title: 'Every carriage position',
    startedAt: '2026-11-20T11:00:00Z',
    beats: POSITIONS(8),
    faults: [{ kind: 'carriage-off', position: 5, by: 1 }],
    notes: [{ beat: 4, text: 'Detent at 5 feels soft.' }],
  },
  {
    machine: 'bittern',
    tester: 'tester',
    title: 'Nines ripple',
    startedAt: '2026-11-24T08:45:00Z',
    beats: RIPPLE,
    slips: [
      { beat: 2, wheel: 9, glyph: '0~' },
      { beat: 2, wheel: 12, glyph: '?' },
    ],
    note: 'Wheel 9 stopped between two numerals; the window at 12 is still masked.',
  },
  {
    machine: 'avocet',
    tester: 'tester',
    title: 'Acceptance: there and back',
    startedAt: '2026-10-29T07:50:00Z',
    beats: THERE_AND_BACK,
  },
  {
    machine: 'avocet',
    tester: 'tester',
    title: 'Product by turns and shifts',
    startedAt: '2026-10-29T08:30:00Z',
    beats: PRODUCT,
    note: '4087 × 369 = 1 508 103.',
  },
  {
    machine: 'avocet',
    tester: 'tester',
    title: 'Yearly check',
    startedAt: '2026-11-26T13:30:00Z',
    beats: DIGITS,
    faults: [{ kind: 'slide-off', slide: 4, by: -1 }],
  },
  {
    machine: 'dunlin',
    tester: 'builder',
    title: 'Dry run without the carriage detents',
    startedAt: '2026-11-30T15:05:00Z',
    beats: SMOKE.slice(0, 4),
    faults: [{ kind: 'carry-held', wheel: 2 }],
    unfinished: true,
    notes: [{ beat: 2, text: 'Lever stays up after the carry; spring looks short.' }],
  },
];
