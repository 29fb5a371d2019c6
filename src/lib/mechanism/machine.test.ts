import { describe, expect, it } from 'vitest';
import type { Fault } from './faults';
import { acceptLayout, type Layout, type LayoutDescription } from './layout';
import { createMachine, simulate } from './machine';
import type { Operation } from './steps';

function layoutOf(description: LayoutDescription = {}): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
  return layout.value;
}

const set = (slides: string): Operation => ({ do: 'set', slides });
const add = (times = 1): Operation => ({ do: 'turn', way: 'add', times });
const subtract = (times = 1): Operation => ({ do: 'turn', way: 'subtract', times });
const shift = (to: number): Operation => ({ do: 'shift', to });

const run = (steps: Operation[], faults: Fault[] = [], description: LayoutDescription = {}, result?: string) =>
  simulate({ layout: layoutOf(description), faults, steps, start: { result } });

describe('worked examples', () => {
  it('the plain smoke test: lowest slide 7, nine turns (common practice)', () => {
    const states = run([set('7'), ...Array.from({ length: 9 }, () => add())]).slice(1);
    expect(states.map(({ result, counter }) => `${Number(result)}/${Number(counter)}`)).toEqual(
      '7/1 14/2 21/3 28/4 35/5 42/6 49/7 56/8 63/9'.split(' '),
    );
    const carried = states.flatMap(({ carries }, index) => (carries.includes(2) ? [index + 1] : []));
    expect(carried).toEqual([2, 3, 5, 6, 8, 9]);
  });

  it('a product by repeated turns and shifts: 305 × 204 = 62220', () => {
    const states = run([set('305'), add(4), shift(2), shift(3), add(2)]);
    expect(states.at(-1)).toMatchObject({ result: '00000062220', counter: '000204' });
  });

  it('a quotient by repeated subtraction: 87654 ÷ 321 = 273, rest 21', () => {
    const steps = [set('321'), { do: 'reverse', on: true } as const];
    const states = run(
      [...steps, shift(3), subtract(2), shift(2), subtract(7), shift(1), subtract(3)],
      [],
      {},
      '87654',
    );
    expect(states.at(-1)).toMatchObject({ result: '00000000021', counter: '000273' });
  });

  it('squares as sums of odd numbers, a theorem of the Pythagoreans', () => {
    const machine = createMachine(layoutOf());
    for (let root = 1; root <= 200; root += 1) {
      machine.apply(set(String(2 * root - 1)));
      const { result, counter } = machine.apply(add());
      expect([Number(result), Number(counter)]).toEqual([root * root, root]);
    }
  });

  it("the nines' complement of 123456789012 in twelve places is 876543210987", () => {
    // Subtracting from nines shows the complement; the value was computed with two number libraries.
    const twelve = { settingSlides: 12, resultWheels: 12 };
    const states = run([set('123456789012'), subtract()], [], twelve, '999999999999');
    expect(states.at(-1)?.result).toBe('876543210987');
  });
});

describe('carries', () => {
  const twelve = { settingSlides: 12, resultWheels: 12 };
  const nines = (faults: Fault[]) => run([set('1'), add()], faults, twelve, '999999999999').at(-1)?.result;

  it('one more on nines detects and locates each missed carry: twelve different readings', () => {
    // A consequence of the theory of ripple-carry arrays: every carry is exercised, every wheel is visible.
    const missed = Array.from({ length: 11 }, (_, index): Fault => ({ kind: 'carry-missed', wheel: index + 2 }));
    const readings = [nines([]), ...missed.map((fault) => nines([fault]))];
    expect(new Set(readings).size).toBe(12);
    expect(readings[0]).toBe('000000000000');
    expect(readings[1]).toBe('999999999990');
    expect(readings[11]).toBe('900000000000');
  });

  it('setting 9 detects any one tooth, in all columns at once', () => {
    for (let tooth = 1; tooth <= 9; tooth += 1) {
      const states = run([set('99999999'), add()], [{ kind: 'tooth-short', tooth, drum: 'add' }]);
      expect(states.at(-1)?.result).toBe('00088888888');
    }
  });

  it('wrap at the highest wheel and say so; below zero stands in nines', () => {
    const [, over] = run([set('1'), add()], [], {}, '99999999999');
    expect(over).toMatchObject({ result: '00000000000', overflow: true, carries: [2, 3, 4, 5, 6, 7, 8, 9, 10, 11] });
    const [, under] = run([set('1'), subtract()], [], { subtraction: 'reverse' });
    expect(under).toMatchObject({ result: '99999999999', overflow: true });
    const [, complement] = run([set('1'), subtract()]);
    expect(complement).toMatchObject({ result: '99999999999', overflow: false });
  });

  it('are lost above their reach', () => {
    const [, state] = run([set('1'), add()], [], { resultCarry: 2 }, '00000009999');
    expect(state).toMatchObject({ result: '00000009000', carries: [2, 3] });
  });
});

describe('faults together', () => {
  it('a held lever works on without a drive and through a clearing', () => {
    const steps = [set('5'), add(2), set('0'), { do: 'clear', what: 'both' } as const, add(), add()];
    const states = run(steps, [{ kind: 'carry-held', wheel: 2 }]);
    expect(states.map(({ result }) => Number(result))).toEqual([0, 10, 10, 0, 10, 20]);
    expect(states.at(-1)?.carries).toEqual([2]);
  });

  it('a lever that is held and whose carry is missed does nothing at all', () => {
    const faults: Fault[] = [
      { kind: 'carry-held', wheel: 2 },
      { kind: 'carry-missed', wheel: 2 },
    ];
    expect(run([set('5'), add(2), set('0'), add(3)], faults).at(-1)?.result).toBe('00000000000');
  });

  it('a stuck slide that is also off is moved after, and teeth bite on what is left', () => {
    const stuck: Fault = { kind: 'slide-stuck', slide: 1, at: 9 };
    const off: Fault = { kind: 'slide-off', slide: 1, by: -1 };
    const teeth: Fault[] = [4, 8].map((tooth) => ({ kind: 'tooth-short', tooth, drum: 'add' }));
    expect(run([set('3'), add()], [off, stuck]).at(-1)?.result).toBe('00000000008');
    // Eight steps: the fourth does not bite, which leaves seven, too few for the eighth to matter.
    expect(run([set('3'), add()], [off, ...teeth, stuck]).at(-1)?.result).toBe('00000000007');
  });

  it('one cause listed twice is one cause, and of two stuck positions the last one listed stands', () => {
    const short: Fault = { kind: 'wheel-short', wheel: 1 };
    expect(run([set('5'), add()], [short, { ...short, rate: 1 }]).at(-1)?.result).toBe('00000000004');
    const stuck = [3, 8].map((at): Fault => ({ kind: 'slide-stuck', slide: 1, at }));
    expect(run([set('5'), add()], stuck).at(-1)?.result).toBe('00000000008');
    const off: Fault = { kind: 'slide-off', slide: 1, by: 1 };
    expect(run([set('5'), add()], [off, off]).at(-1)?.result).toBe('00000000006');
  });

  it('a dead reversing lever stands thrown all the same', () => {
    const [thrown, turned] = run([{ do: 'reverse', on: true }, add()], [{ kind: 'reverse-dead' }]);
    expect(thrown?.reversed).toBe(true);
    expect(turned).toMatchObject({ counter: '000001', reversed: true });
  });

  it('acts as often as its rate says, and as the seed has it', () => {
    const layout = layoutOf();
    const missed = (seed: number): number => {
      const machine = createMachine(layout, { faults: [{ kind: 'counter-missed', wheel: 1, rate: 0.35 }], seed });
      return 10_000 - Number(machine.apply(add(10_000)).counter);
    };
    expect(missed(1)).toBe(missed(1));
    expect(missed(1)).not.toBe(missed(2));
    // Six standard deviations of a binomial count of 10,000 at 0.35 are 286.
    for (const seed of [1, 2, 3]) expect(Math.abs(missed(seed) - 3_500)).toBeLessThan(286);
  });

  it('a tooth that bites only sometimes does so column by column', () => {
    const faults: Fault[] = [{ kind: 'tooth-short', tooth: 4, drum: 'add', rate: 0.5 }];
    const machine = createMachine(layoutOf(), { faults, seed: 3 });
    machine.apply(set('55555555'));
    const seen = new Set<string>();
    for (let turn = 0; turn < 20; turn += 1) {
      machine.apply({ do: 'clear', what: 'result' });
      seen.add(machine.apply(add()).result);
    }
    expect(seen.size).toBeGreaterThan(5);
    for (const result of seen) expect(result).toMatch(/^000[45]{8}$/);
  });
});

describe('a machine under the hand', () => {
  it('keeps its wheels and carries the same however it is turned', () => {
    const [quick, plain] = [createMachine(layoutOf()), createMachine(layoutOf())];
    for (const operation of [set('98765432'), shift(2)]) {
      quick.apply(operation);
      plain.apply(operation);
    }
    for (let turn = 0; turn < 50; turn += 1) {
      const way = turn % 11 === 7 ? 'subtract' : 'add';
      quick.turn(way);
      const state = plain.apply({ do: 'turn', way });
      expect(quick.state).toEqual(state);
      const bits = state.carries.reduce((sum, wheel) => sum + 2 ** (wheel - 1), 0);
      expect(quick.carryBits >>> 0).toBe(bits);
      expect([...quick.result].reverse().join('')).toBe(state.result);
    }
    quick.apply({ do: 'clear', what: 'both' });
    expect(quick.state).toMatchObject({ result: '00000000000', counter: '000000', carries: [], overflow: false });
    quick.turn('add');
    expect(quick.state.result).toBe('00987654320');
  });

  it('refuses what no door has let through', () => {
    const machine = createMachine(layoutOf({ subtraction: 'none' }));
    expect(() => machine.apply(set('x'))).toThrow('Not accepted');
    expect(() => machine.apply(subtract())).toThrow('does not subtract');
  });
});
