import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { Decimal } from 'decimal.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createMachine, simulate } from '@/lib/mechanism/machine';
import type { Operation } from '@/lib/mechanism/steps';
import { accepted, anyLayout, anyOperation, anyRun, anyStart, digits, fullReach, type Run } from './arbitraries';
import { SlowMachine } from './slow-machine';

const BC = '/usr/bin/bc';

/** What a run comes to as a sum: the slides' values with their places and signs, from the last clearing on. */
function terms(run: Run): { result: [bigint, number][]; counter: [bigint, number][] } {
  let slides = 0n;
  let place = 0;
  let reversed = false;
  const sums = { result: [[BigInt(run.start.result || '0'), 0]], counter: [[BigInt(run.start.counter || '0'), 0]] } as {
    result: [bigint, number][];
    counter: [bigint, number][];
  };
  for (const step of run.steps) {
    if (step.do === 'set') slides = BigInt(step.slides);
    if (step.do === 'shift') place = step.to - 1;
    if (step.do === 'reverse') reversed = step.on;
    if (step.do === 'clear' && step.what !== 'counter') sums.result = [];
    if (step.do === 'clear' && step.what !== 'result') sums.counter = [];
    if (step.do !== 'turn') continue;
    const sign = step.way === 'add' ? 1n : -1n;
    const times = BigInt(step.times ?? 1);
    sums.result.push([sign * times * slides, place]);
    sums.counter.push([(reversed ? -sign : sign) * times, place]);
  }
  return sums;
}

const byBigInt = (sum: [bigint, number][], wheels: number): string => {
  const modulus = 10n ** BigInt(wheels);
  const total = sum.reduce((all, [value, place]) => all + value * 10n ** BigInt(place), 0n);
  return wheels === 0 ? '' : (((total % modulus) + modulus) % modulus).toString().padStart(wheels, '0');
};

const Wide = Decimal.clone({ precision: 400, toExpPos: 500, modulo: Decimal.EUCLID });
const byDecimal = (sum: [bigint, number][], wheels: number): string => {
  const total = sum.reduce(
    (all, [value, place]) => all.plus(new Wide(value.toString()).times(new Wide(10).pow(place))),
    new Wide(0),
  );
  return wheels === 0 ? '' : total.mod(new Wide(10).pow(wheels)).toFixed(0).padStart(wheels, '0');
};

const lastOf = (run: Run) => {
  const state = simulate({ ...run, layout: accepted(run.layout) }).at(-1);
  if (!state) throw new Error('a run has steps');
  return state;
};

describe('a healthy machine whose carries reach everywhere is plain arithmetic', () => {
  it('against BigInt and decimal.js', () => {
    fc.assert(
      fc.property(anyRun(fullReach(), { times: 1_000_000 }), (run) => {
        const { result, counter } = lastOf(run);
        const sums = terms(run);
        expect(result).toBe(byBigInt(sums.result, run.layout.resultWheels));
        expect(result).toBe(byDecimal(sums.result, run.layout.resultWheels));
        expect(counter).toBe(byBigInt(sums.counter, run.layout.counterWheels));
        expect(counter).toBe(byDecimal(sums.counter, run.layout.counterWheels));
      }),
      { numRuns: 300 },
    );
  });

  it.skipIf(!existsSync(BC))('against GNU bc', () => {
    const runs = fc.sample(anyRun(fullReach(), { times: 1_000_000 }), 150);
    const lines = runs.flatMap((run) => {
      const { result, counter } = terms(run);
      return [
        { sum: result, wheels: run.layout.resultWheels },
        { sum: counter, wheels: run.layout.counterWheels },
      ].map(({ sum, wheels }) => {
        const total = sum.map(([value, place]) => `(${value})*10^${place}`).join('+') || '0';
        return `m=10^${wheels}; (((${total}) % m) + m) % m`;
      });
    });
    const printed = execFileSync(BC, ['-q'], { input: `${lines.join('\n')}\n`, env: { BC_LINE_LENGTH: '0' } });
    const values = printed.toString().trim().split('\n');
    expect(values).toHaveLength(lines.length);
    runs.forEach((run, index) => {
      const { result, counter } = lastOf(run);
      expect(BigInt(result)).toBe(BigInt(values[2 * index] ?? ''));
      expect(BigInt(counter || '0')).toBe(BigInt(values[2 * index + 1] ?? ''));
    });
  });

  it('adding and subtracting as often returns', () => {
    const setting = fullReach().chain((layout) =>
      fc.tuple(fc.constant(layout), anyStart(layout), digits(layout.settingSlides), fc.integer({ min: 1, max: 5_000 })),
    );
    fc.assert(
      fc.property(setting, ([layout, start, slides, times]) => {
        const there: Operation[] = [
          { do: 'set', slides },
          { do: 'turn', way: 'add', times },
        ];
        const steps: Operation[] = [...there, { do: 'turn', way: 'subtract', times }];
        expect(lastOf({ layout, start, faults: [], steps })).toMatchObject(start);
      }),
    );
  });

  it('complement and reverse subtraction show the same', () => {
    fc.assert(
      fc.property(anyRun(fullReach()), (run) => {
        const [complement, reverse] = (['complement', 'reverse'] as const).map((subtraction) =>
          lastOf({ ...run, layout: { ...run.layout, subtraction } }),
        );
        expect(complement?.result).toBe(reverse?.result);
        expect(complement?.counter).toBe(reverse?.counter);
      }),
    );
  });
});

describe('the machine against a second one written from its definition', () => {
  it.each([
    { faults: 0, numRuns: 250 },
    { faults: 1, numRuns: 400 },
    { faults: 2, numRuns: 400 },
    { faults: 8, numRuns: 400 },
    { faults: 60, numRuns: 150 },
  ])('with up to $faults faults at once, on any layout', ({ faults, numRuns }) => {
    fc.assert(
      fc.property(anyRun(anyLayout(), { faults, times: 30 }), (run) => {
        const slow = new SlowMachine(run.layout, run.start, run.faults);
        const states = simulate({ ...run, layout: accepted(run.layout) });
        expect(states).toEqual(run.steps.map((step) => slow.apply(step)));
      }),
      { numRuns },
    );
  });

  it('with faults crowded on a few wheels', () => {
    const small = anyLayout({ slides: 3, wheels: 4, counter: 3, positions: 3 });
    fc.assert(
      fc.property(anyRun(small, { faults: 12, times: 40 }), (run) => {
        const slow = new SlowMachine(run.layout, run.start, run.faults);
        const states = simulate({ ...run, layout: accepted(run.layout) });
        expect(states).toEqual(run.steps.map((step) => slow.apply(step)));
      }),
      { numRuns: 1_500 },
    );
  });
});

describe('many turns at once', () => {
  it('are the same as one by one, with faults that always act', () => {
    const setting = anyRun(anyLayout(), { faults: 6, steps: 8 }).chain((run) =>
      fc.record({
        run: fc.constant(run),
        way: fc.constantFrom(
          ...(run.layout.subtraction === 'none' ? (['add'] as const) : (['add', 'subtract'] as const)),
        ),
        times: fc.integer({ min: 1, max: 3_000 }),
      }),
    );
    fc.assert(
      fc.property(setting, ({ run, way, times }) => {
        const layout = accepted(run.layout);
        const [together, apart] = [createMachine(layout, run), createMachine(layout, run)];
        for (const step of run.steps) {
          together.apply(step);
          apart.apply(step);
        }
        const state = together.apply({ do: 'turn', way, times });
        let overflow = false;
        for (let turn = 0; turn < times; turn += 1) overflow = apart.apply({ do: 'turn', way }).overflow || overflow;
        expect(state).toEqual({ ...apart.state, overflow });
        // What is not seen, such as a held lever, must be the same too.
        expect(together.apply({ do: 'turn', way })).toEqual(apart.apply({ do: 'turn', way }));
      }),
      { numRuns: 300 },
    );
  });

  it('are the same as one by one, with faults that act only sometimes', () => {
    const setting = anyRun(anyLayout({ wheels: 15 }), { faults: 6 }).chain((run) =>
      fc.tuple(
        fc.constant(run),
        fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 6, maxLength: 6 }),
        fc.integer(),
      ),
    );
    fc.assert(
      fc.property(setting, ([run, rates, seed]) => {
        const layout = accepted(run.layout);
        const faults = run.faults.map((fault, index) => ({ ...fault, rate: rates[index] ?? 1 }));
        const together = simulate({ ...run, layout, faults, seed });
        expect(simulate({ ...run, layout, faults, seed })).toEqual(together);
        const apart = createMachine(layout, { start: run.start, faults, seed });
        run.steps.forEach((step, index) => {
          if (step.do !== 'turn') apart.apply(step);
          else for (let turn = 0; turn < (step.times ?? 1); turn += 1) apart.apply({ do: 'turn', way: step.way });
          expect(apart.state.result).toBe(together[index]?.result);
          expect(apart.state.counter).toBe(together[index]?.counter);
        });
      }),
      { numRuns: 200 },
    );
  });

  it('a fault with rate 0 never acts, whatever the seed', () => {
    fc.assert(
      fc.property(anyRun(anyLayout(), { faults: 20 }), fc.integer(), (run, seed) => {
        const layout = accepted(run.layout);
        const faults = run.faults.map((fault) => ({ ...fault, rate: 0 }));
        expect(simulate({ ...run, layout, faults, seed })).toEqual(simulate({ ...run, layout, faults: [] }));
      }),
      { numRuns: 100 },
    );
  });
});

describe('independent wheels', () => {
  it('without carries in play, permuting the columns permutes the result and nothing else', () => {
    const columns = fc.integer({ min: 1, max: 16 }).chain((wheels) =>
      fc.record({
        values: fc.array(fc.tuple(fc.integer({ min: 0, max: 4 }), fc.integer({ min: 0, max: 5 })), {
          minLength: wheels,
          maxLength: wheels,
        }),
        order: fc.shuffledSubarray([...Array(wheels).keys()], { minLength: wheels, maxLength: wheels }),
      }),
    );
    fc.assert(
      fc.property(columns, ({ values, order }) => {
        const run = (pairs: readonly (readonly [number, number])[]): string => {
          const size = { settingSlides: pairs.length, resultWheels: pairs.length };
          const layout = accepted({
            ...size,
            counterWheels: 1,
            carriagePositions: 1,
            subtraction: 'none',
            complementColumns: null,
            resultCarry: null,
            counterCarry: true,
          });
          const text = (which: 0 | 1) => pairs.map((pair) => pair[which]).join('');
          const machine = createMachine(layout, { start: { result: text(1) } });
          machine.apply({ do: 'set', slides: text(0) });
          const state = machine.apply({ do: 'turn', way: 'add' });
          expect(state.carries).toEqual([]);
          return state.result;
        };
        const plain = run(values);
        const shuffled = run(order.map((index) => values[index] as [number, number]));
        expect(shuffled).toBe(order.map((index) => plain[index]).join(''));
      }),
    );
  });
});

describe('arbitrary operations', () => {
  it('are all generated', () => {
    const layout = fc.sample(fullReach(), 1)[0];
    if (!layout) throw new Error('a layout');
    const kinds = new Set(fc.sample(anyOperation(layout), 300).map((operation) => operation.do));
    expect([...kinds].sort()).toEqual(['clear', 'reverse', 'set', 'shift', 'turn']);
  });
});
