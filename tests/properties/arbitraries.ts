import fc from 'fast-check';
import { type Fault, faultDictionary } from '@/lib/mechanism/faults';
import { acceptLayout, type Layout } from '@/lib/mechanism/layout';
import type { Operation } from '@/lib/mechanism/steps';
import type { PlainLayout } from './slow-machine';

export interface Sizes {
  slides?: number;
  wheels?: number;
  counter?: number;
  positions?: number;
}

/** Any layout allowed, or a small one for checks that count everything out. */
export function anyLayout(most: Sizes = {}): fc.Arbitrary<PlainLayout> {
  const reach = (least: number) => fc.option(fc.integer({ min: least, max: 12 }), { nil: null, freq: 2 });
  return fc.record({
    settingSlides: fc.integer({ min: 1, max: most.slides ?? 32 }),
    resultWheels: fc.integer({ min: 1, max: most.wheels ?? 32 }),
    counterWheels: fc.integer({ min: 0, max: most.counter ?? 32 }),
    carriagePositions: fc.integer({ min: 1, max: most.positions ?? 32 }),
    subtraction: fc.constantFrom('complement', 'reverse', 'none'),
    complementColumns: reach(1),
    resultCarry: reach(0),
    counterCarry: fc.boolean(),
  });
}

/** Layouts on which a healthy machine is plain arithmetic. */
export function fullReach(most: Sizes = {}): fc.Arbitrary<PlainLayout> {
  return anyLayout(most).map((layout) => ({
    ...layout,
    subtraction: layout.subtraction === 'none' ? 'reverse' : layout.subtraction,
    complementColumns: null,
    resultCarry: null,
    counterCarry: true,
  }));
}

export function accepted(layout: PlainLayout): Layout {
  const result = acceptLayout(layout);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.value;
}

/** Digits in which nines and zeros are common: they are what carries are made of. */
export function digits(length: number): fc.Arbitrary<string> {
  const digit = fc.oneof(fc.constantFrom('9', '9', '0'), fc.constantFrom(...'0123456789'));
  return fc.array(digit, { minLength: length, maxLength: length }).map((glyphs) => glyphs.join(''));
}

export function anyOperation(layout: PlainLayout, mostTimes = 12): fc.Arbitrary<Operation> {
  const ways = layout.subtraction === 'none' ? (['add'] as const) : (['add', 'subtract'] as const);
  return fc.oneof(
    { weight: 3, arbitrary: digits(layout.settingSlides).map((slides) => ({ do: 'set' as const, slides })) },
    {
      weight: 6,
      arbitrary: fc.record({
        do: fc.constant('turn' as const),
        way: fc.constantFrom(...ways),
        times: fc.integer({ min: 1, max: mostTimes }),
      }),
    },
    {
      weight: 2,
      arbitrary: fc.integer({ min: 1, max: layout.carriagePositions }).map((to) => ({ do: 'shift' as const, to })),
    },
    { weight: 1, arbitrary: fc.boolean().map((on) => ({ do: 'reverse' as const, on })) },
    {
      weight: 1,
      arbitrary: fc.constantFrom('result', 'counter', 'both').map((what) => ({ do: 'clear' as const, what })),
    },
  ) as fc.Arbitrary<Operation>;
}

export function anyStart(layout: PlainLayout): fc.Arbitrary<{ result: string; counter: string }> {
  return fc.record({ result: digits(layout.resultWheels), counter: digits(layout.counterWheels) });
}

/** Up to `most` faults of the layout's dictionary at once. */
export function anyFaults(layout: PlainLayout, most: number): fc.Arbitrary<Fault[]> {
  return fc.uniqueArray(fc.constantFrom(...faultDictionary(accepted(layout))), { maxLength: most });
}

export interface Run {
  layout: PlainLayout;
  start: { result: string; counter: string };
  faults: Fault[];
  steps: Operation[];
}

export function anyRun(
  layouts: fc.Arbitrary<PlainLayout>,
  options: { faults?: number; steps?: number; times?: number } = {},
): fc.Arbitrary<Run> {
  return layouts.chain((layout) =>
    fc.record({
      layout: fc.constant(layout),
      start: anyStart(layout),
      faults: anyFaults(layout, options.faults ?? 0),
      steps: fc.array(anyOperation(layout, options.times), { minLength: 1, maxLength: options.steps ?? 25 }),
    }),
  );
}
