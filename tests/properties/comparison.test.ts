import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compare, type JudgedReading, type LadderWheel } from '@/lib/comparison/compare';
import type { Operation, Step } from '@/lib/mechanism/steps';
import { accepted, anyLayout, anyRun, type Run } from './arbitraries';
import { type PlainLayout, SlowMachine } from './slow-machine';

const REGISTERS = ['result', 'counter'] as const;
type Registers = { result: string; counter: string };
type Marks = readonly boolean[];

/** The run of a machine with its faults, read after the steps marked; `blur` changes what the tester writes down. */
function logged(run: Run, read: Marks, blur: (text: string, step: number) => string = (text) => text): Step[] {
  const machine = new SlowMachine(run.layout, run.start, run.faults);
  return run.steps.map((operation, index) => {
    const { result, counter } = machine.apply(operation);
    if (!read[index % read.length]) return operation;
    return { ...operation, read: { result: blur(result, index), counter: blur(counter, index + 1) } };
  });
}

const single = (steps: readonly Operation[]): Operation[] =>
  steps.map((step) => (step.do === 'turn' ? { do: 'turn', way: step.way } : step));

const wheels = (reading: JudgedReading): LadderWheel[] => [...reading.result, ...reading.counter];

const marks = fc.array(fc.boolean(), { minLength: 1, maxLength: 7 });

describe('a machine compared with itself', () => {
  it('agrees, and misses no carry', () => {
    fc.assert(
      fc.property(anyRun(anyLayout()), marks, (run, read) => {
        const comparison = compare({ layout: accepted(run.layout), start: run.start, steps: logged(run, read) });
        expect(comparison.agrees).toBe(true);
        expect(comparison.firstFault).toBeNull();
        for (const wheel of comparison.readings.flatMap(wheels)) {
          expect(wheel).toMatchObject({ verdict: 'agrees', stepsOff: 0, follows: false });
          expect(wheel.read).toBe(String(wheel.expected));
          expect(wheel.expectedFromLast).toBe(wheel.expected);
          expect(wheel.carryMade === false && wheel.carryDue === true).toBe(false);
        }
      }),
      { numRuns: 300 },
    );
  });

  it('knows every carry when each turn is read', () => {
    fc.assert(
      fc.property(anyRun(anyLayout()), (run) => {
        const steps = single(run.steps);
        const machine = new SlowMachine(run.layout, run.start);
        const comparison = compare({
          layout: accepted(run.layout),
          start: run.start,
          steps: logged({ ...run, steps }, [true]),
        });
        comparison.readings.forEach((reading, index) => {
          machine.apply(steps[index] as Operation);
          for (const register of REGISTERS)
            for (const { wheel, carryDue, carryMade } of reading[register]) {
              expect(carryDue).toBe(machine.due[register].has(wheel));
              expect(carryMade).toBe(machine.due[register].has(wheel));
            }
        });
      }),
      { numRuns: 200 },
    );
  });

  it('never differs where the tester could not read', () => {
    const blurs = fc.array(fc.constantFrom('', '', '?', '~'), { minLength: 5, maxLength: 23 });
    fc.assert(
      fc.property(anyRun(anyLayout()), marks, blurs, (run, read, blur) => {
        const steps = logged(run, read, (text, step) =>
          [...text]
            .map((glyph, place) => {
              const mark = blur[(place + step * 7) % blur.length];
              // A wheel seen between two numerals may stand on either of them.
              const between = (place + step) % 2 === 0 ? glyph : String((Number(glyph) + 9) % 10);
              return mark === '?' ? '?' : mark === '~' ? `${between}~` : glyph;
            })
            .join(''),
        );
        const comparison = compare({ layout: accepted(run.layout), start: run.start, steps });
        for (const wheel of comparison.readings.flatMap(wheels)) expect(wheel.verdict).not.toBe('differs');
      }),
      { numRuns: 300 },
    );
  });
});

/** Every register a reading leaves possible, written out one by one. */
function everyRegister(glyphs: readonly string[]): string[] {
  let texts = [''];
  for (const glyph of glyphs) {
    const digit = Number(glyph[0]);
    const digits = glyph === '?' ? [...'0123456789'] : glyph[1] ? [`${digit}`, `${(digit + 1) % 10}`] : [glyph];
    texts = texts.flatMap((text) => digits.map((each) => text + each));
  }
  return texts;
}

const glyphsOf = (text: string): string[] => text.match(/\?|\d~?/gu) ?? [];

interface Setting {
  slides: string;
  to: number;
  on: boolean;
}

/** All ways in which the carries from excluded wheels may go in `turns` turns. */
function everyForce(into: readonly number[], turns: number): Map<number, boolean>[][] {
  const once = into.reduce<Map<number, boolean>[]>(
    (maps, wheel) => maps.flatMap((map) => [true, false].map((made) => new Map(map).set(wheel, made))),
    [new Map()],
  );
  let all: Map<number, boolean>[][] = [[]];
  for (let turn = 0; turn < turns; turn += 1) all = all.flatMap((list) => once.map((map) => [...list, map]));
  return all;
}

/** Digits that a healthy machine may show after `steps`, counted out over everything the last reading left open. */
function countedOut(
  layout: PlainLayout,
  from: Registers,
  setting: Setting,
  steps: readonly Operation[],
  excluded: readonly number[],
): { result: Set<string>[]; counter: Set<string>[] } {
  const seen = {
    result: Array.from({ length: layout.resultWheels }, () => new Set<string>()),
    counter: Array.from({ length: layout.counterWheels }, () => new Set<string>()),
  };
  const turns = steps.filter((step) => step.do === 'turn').length;
  const forces = everyForce(
    excluded.map((wheel) => wheel + 1),
    turns,
  );
  const run = (start: { result?: string; counter?: string }, force: Map<number, boolean>[]): Registers => {
    const machine = new SlowMachine(layout, start);
    machine.apply({ do: 'set', slides: setting.slides });
    machine.apply({ do: 'shift', to: setting.to });
    let state = machine.apply({ do: 'reverse', on: setting.on });
    let turn = 0;
    for (const step of steps) {
      const forced = { result: step.do === 'turn' ? (force[turn++] ?? new Map()) : new Map<number, boolean>() };
      state = machine.apply(step, forced);
    }
    return state;
  };
  const note = (sets: Set<string>[], text: string): void =>
    sets.forEach((set, index) => {
      set.add(text[text.length - 1 - index] ?? '');
    });
  for (const result of everyRegister(glyphsOf(from.result)))
    for (const force of forces) note(seen.result, run({ result }, force).result);
  for (const counter of everyRegister(glyphsOf(from.counter)))
    note(seen.counter, run({ counter }, forces[0] ?? []).counter);
  return seen;
}

function expectCounted(judged: readonly LadderWheel[], counted: readonly Set<string>[], exact: boolean): void {
  judged.forEach((wheel, index) => {
    const digits = counted[index] ?? new Set();
    if (!exact) {
      if (digits.has(wheel.read)) expect(wheel.verdict).not.toBe('differs');
      if (wheel.expectedFromLast !== null) expect([...digits]).toEqual([String(wheel.expectedFromLast)]);
      return;
    }
    expect(wheel.expectedFromLast).toBe(digits.size === 1 ? Number([...digits][0]) : null);
    if (wheel.verdict === 'agrees' || wheel.verdict === 'differs')
      expect(wheel.verdict === 'agrees').toBe(digits.has(wheel.read));
  });
}

/** Follows a run reading by reading and holds each against what counting out says. */
function expectExact(run: Run, steps: readonly Step[], excluded: readonly number[] = []): void {
  const comparison = compare({
    layout: accepted(run.layout),
    start: run.start,
    steps,
    excluded: excluded.map((wheel) => ({ register: 'result' as const, wheel })),
  });
  let from: Registers = run.start;
  let since: Operation[] = [];
  let setting: Setting = { slides: '0'.repeat(run.layout.settingSlides), to: 1, on: false };
  let next = { ...setting };
  steps.forEach((step, index) => {
    since.push(step);
    if (step.do === 'set') next.slides = step.slides;
    if (step.do === 'shift') next.to = step.to;
    if (step.do === 'reverse') next.on = step.on;
    const reading = comparison.readings.find((each) => each.step === index);
    if (!step.read || !reading) return;
    const counted = countedOut(run.layout, from, setting, since, excluded);
    // With a wheel left out right below one that is driven a full round, more digits may be allowed, never fewer.
    const exact = excluded.length === 0 || run.layout.subtraction !== 'complement';
    for (const register of REGISTERS) expectCounted(reading[register], counted[register], exact);
    from = { result: step.read.result ?? '', counter: step.read.counter ?? '' };
    since = [];
    setting = next;
    next = { ...next };
  });
}

/** Readings of anything at all: digits that no machine would show, between, unread. */
function scribbled(run: Run, read: Marks, glyphs: readonly string[]): Step[] {
  let used = 0;
  const take = (count: number): string =>
    Array.from({ length: count }, () => glyphs[used++ % glyphs.length] ?? '0').join('');
  return run.steps.map((step, index) =>
    read[index % read.length]
      ? { ...step, read: { result: take(run.layout.resultWheels), counter: take(run.layout.counterWheels) } }
      : step,
  );
}

const glyph = fc.oneof(
  { weight: 5, arbitrary: fc.constantFrom(...'0123456789999') },
  { weight: 2, arbitrary: fc.constant('?') },
  { weight: 2, arbitrary: fc.integer({ min: 0, max: 9 }).map((digit) => `${digit}~`) },
);
const scribbles = fc.array(glyph, { minLength: 3, maxLength: 17 });

describe('digits possible after a reading, against counting every register out', () => {
  const tiny = anyLayout({ slides: 3, wheels: 3, counter: 3, positions: 3 });
  const limited = tiny.map((layout) => ({ ...layout, resultWheels: 3, resultCarry: layout.settingSlides % 2 }));

  it('on any small layout', () => {
    fc.assert(
      fc.property(anyRun(tiny, { steps: 9, times: 15 }), marks, scribbles, (run, read, glyphs) =>
        expectExact(run, scribbled(run, read, glyphs)),
      ),
      { numRuns: 150 },
    );
  });

  it('where carries reach further in one place than in another', () => {
    fc.assert(
      fc.property(anyRun(limited, { steps: 14, times: 9 }), marks, scribbles, (run, read, glyphs) =>
        expectExact(run, scribbled(run, read, glyphs)),
      ),
      { numRuns: 200 },
    );
  });

  it.each([
    { name: 'any small layout', layouts: tiny },
    { name: 'carries that do not always reach', layouts: limited },
  ])('with a wheel left out of the judgement, on $name', ({ layouts }) => {
    const setting = anyRun(layouts, { steps: 5, times: 1 }).chain((run) =>
      fc.tuple(fc.constant(run), fc.integer({ min: 1, max: run.layout.resultWheels }), marks, scribbles),
    );
    fc.assert(
      fc.property(setting, ([run, wheel, read, glyphs]) =>
        expectExact(
          { ...run, steps: single(run.steps) },
          scribbled({ ...run, steps: single(run.steps) }, read, glyphs),
          [wheel],
        ),
      ),
      { numRuns: 150 },
    );
  });
});

describe('carries judged from what the wheel below really did', () => {
  const carryFaults = (run: Run): Run => ({
    ...run,
    faults: run.faults.filter(({ kind }) => ['carry-missed', 'carry-held', 'counter-carry-missed'].includes(kind)),
  });
  const everyTurn = (run: Run) => {
    const once = { ...run, steps: single(run.steps).filter(({ do: what }) => what !== 'clear') };
    const machine = new SlowMachine(once.layout, once.start, once.faults);
    const truths = once.steps.map((step) => {
      const { carries } = machine.apply(step);
      return { made: carries, result: new Set(machine.due.result), counter: new Set(machine.due.counter) };
    });
    return {
      truths,
      comparison: compare({ layout: accepted(run.layout), start: run.start, steps: logged(once, [true]) }),
    };
  };

  it('says of each carry missed or held whether it was due and made, and nothing else', () => {
    fc.assert(
      fc.property(anyRun(anyLayout({ wheels: 12 }), { faults: 40 }), (any) => {
        const { truths, comparison } = everyTurn(carryFaults(any));
        comparison.readings.forEach((reading, index) => {
          const truth = truths[index];
          for (const { wheel, carryDue, carryMade, follows } of reading.result) {
            if (carryDue !== null) expect(carryDue).toBe(truth?.result.has(wheel));
            if (carryMade !== null) expect(carryMade).toBe(truth?.made.includes(wheel));
            if (follows && carryDue !== null) expect(truth?.result.has(wheel)).toBe(truth?.made.includes(wheel));
          }
          for (const { wheel, carryDue } of reading.counter)
            if (carryDue !== null) expect(carryDue).toBe(truth?.counter.has(wheel));
        });
      }),
      { numRuns: 300 },
    );
  });

  it('is never wrong about a carry due, whatever ails the machine', () => {
    fc.assert(
      fc.property(anyRun(anyLayout({ wheels: 12 }), { faults: 10 }), (run) => {
        // A carriage in the wrong place takes the reach of the carries with it.
        fc.pre(run.layout.resultCarry === null || !run.faults.some(({ kind }) => kind === 'carriage-off'));
        const { truths, comparison } = everyTurn(run);
        comparison.readings.forEach((reading, index) => {
          const before =
            comparison.readings[index - 1]?.result.map(({ read }) => read) ?? [...run.start.result].reverse();
          for (const { wheel, carryDue } of reading.result) {
            const below = reading.result[wheel - 2];
            // A full round more is not seen: standing still and going right round look the same.
            const moved = below ? Math.abs(Number(below.read) - Number(before[wheel - 2])) : 5;
            if ([0, 1, 9].includes(moved)) continue;
            if (carryDue !== null) expect(carryDue).toBe(truths[index]?.result.has(wheel));
          }
        });
      }),
      { numRuns: 400 },
    );
  });
});
