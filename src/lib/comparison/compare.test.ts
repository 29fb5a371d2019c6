import { describe, expect, it } from 'vitest';
import { acceptLayout, type Layout, type LayoutDescription } from '../mechanism/layout';
import type { Reading, Step, Way } from '../mechanism/steps';
import { type Comparison, compare, createComparer, type LadderWheel, operationOf, type Place } from './compare';

function layoutOf(description: LayoutDescription = {}): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
  return layout.value;
}

const small = layoutOf({ settingSlides: 3, resultWheels: 3, counterWheels: 3, carriagePositions: 1 });
const backward = layoutOf({ ...small, subtraction: 'reverse' });

const set = (slides: string): Step => ({ do: 'set', slides });
const turn = (read?: Reading, times = 1, way: Way = 'add'): Step => ({ do: 'turn', way, times, read });

const run = (steps: Step[], result?: string, options: { layout?: Layout; excluded?: Place[] } = {}): Comparison =>
  compare({ layout: options.layout ?? small, start: { result }, steps, excluded: options.excluded });

/** A register of the last reading, highest wheel first, one value a wheel. */
function show<T>(comparison: Comparison, of: (wheel: LadderWheel) => T, register: Place['register'] = 'result'): T[] {
  return [...(comparison.readings.at(-1)?.[register] ?? [])].reverse().map(of);
}

const due = (comparison: Comparison) => show(comparison, ({ carryDue }) => carryDue);
const made = (comparison: Comparison) => show(comparison, ({ carryMade }) => carryMade);
const verdicts = (comparison: Comparison) => show(comparison, ({ verdict }) => verdict);
const fromLast = (comparison: Comparison) => show(comparison, ({ expectedFromLast }) => expectedFromLast);

describe('a missed carry', () => {
  const missed = run([set('1'), turn({ result: '090', counter: '001' })], '099');

  it('is one flag at the wheel that should have taken it', () => {
    expect(missed.firstFault).toEqual({ step: 1, register: 'result', wheel: 2 });
    expect(verdicts(missed)).toEqual(['differs', 'differs', 'agrees']);
    expect(due(missed)).toEqual([false, true, false]);
    expect(made(missed)).toEqual([false, false, false]);
  });

  it('lets the wheel above follow: the wheel it kept from passing nine owes it nothing', () => {
    expect(show(missed, ({ follows }) => follows)).toEqual([true, false, false]);
    expect(show(missed, ({ stepsOff }) => stepsOff)).toEqual([-1, -1, 0]);
  });

  it('is not flagged again on later rows, but the register stays wrong', () => {
    const later = run([set('1'), turn({ result: '090' }), turn({ result: '091' })], '099');
    expect(verdicts(later)).toEqual(['agrees', 'agrees', 'agrees']);
    expect(show(later, ({ expected }) => expected)).toEqual([1, 0, 1]);
    expect(fromLast(later)).toEqual([0, 9, 1]);
    expect(later.agrees).toBe(false);
  });

  it('is seen backward too', () => {
    const back = run([set('1'), turn({ result: '109' }, 1, 'subtract')], '100', { layout: backward });
    expect(due(back)).toEqual([false, true, false]);
    expect(made(back)).toEqual([false, false, false]);
    expect(back.firstFault).toMatchObject({ wheel: 2 });
  });

  it('is seen among many turns', () => {
    const many = run([set('5'), turn({ result: '030' }, 8)]);
    expect(due(many)).toEqual([false, true, false]);
    expect(made(many)).toEqual([false, false, false]);
    expect(show(many, ({ stepsOff }) => stepsOff)).toEqual([0, -1, 0]);
    expect(made(run([set('5'), turn({ result: '040' }, 8)]))).toEqual([false, true, false]);
  });
});

describe('other things a carry may be', () => {
  it('made though nobody asked for it', () => {
    const extra = run([set('1'), turn({ result: '011' })]);
    expect(due(extra)).toEqual([false, false, false]);
    expect(made(extra)).toEqual([false, true, false]);
    expect(show(extra, ({ follows }) => follows)).toEqual([false, false, false]);
  });

  it('made as it was due', () => {
    const ripple = run([set('1'), turn({ result: '000' })], '999');
    expect(due(ripple)).toEqual([true, true, false]);
    expect(made(ripple)).toEqual([true, true, false]);
    expect(ripple.agrees).toBe(true);
  });

  it('not to be told, where a wheel is off by something else', () => {
    const off = run([set('1'), turn({ result: '050' })], '009');
    expect(due(off)).toEqual([false, true, false]);
    expect(made(off)).toEqual([false, null, false]);
  });

  it('not to be told, where a driven wheel stood still', () => {
    const still = run([set('90'), turn({ result: '030' })], '030');
    expect(made(still)[1]).toBeNull();
    // Whether wheel 2 stood still or went right round, nobody saw.
    expect(due(still)[0]).toBeNull();
  });

  it('made up for by its opposite: turns both ways between readings', () => {
    const both = run([set('1'), turn(), turn({ result: '009' }, 1, 'subtract')], '009', { layout: backward });
    expect(due(both)).toEqual([false, true, false]);
    expect(made(both)).toEqual([false, true, false]);
    const short = run([set('1'), turn(), turn({ result: '099' }, 1, 'subtract')], '009', { layout: backward });
    expect(made(short)).toEqual([false, null, false]);
  });

  it('of the counter, which has none where it has no carry of its own', () => {
    const plain = layoutOf({ ...small, counterCarry: false });
    const steps = [turn({ counter: '000' }, 10)];
    const counted = run(steps, undefined, { layout: plain });
    expect(show(counted, ({ carryDue, verdict }) => [carryDue, verdict], 'counter')).toEqual([
      [false, 'agrees'],
      [false, 'agrees'],
      [false, 'agrees'],
    ]);
    const carried = run(steps);
    expect(show(carried, ({ carryDue, carryMade }) => [carryDue, carryMade], 'counter')).toEqual([
      [false, false],
      [true, false],
      [false, false],
    ]);
    expect(carried.firstFault).toEqual({ step: 0, register: 'counter', wheel: 2 });
  });
});

describe('what could not be read', () => {
  it('may be any digit: what follows from it agrees with any that is possible', () => {
    const steps = (after: string): Step[] => [set('1'), turn({ result: '09?' }), turn({ result: after })];
    for (const after of ['090', '100', '095', '105']) expect(run(steps(after), '090').agrees).toBe(true);
    const after = run(steps('110'), '090');
    expect(fromLast(after)).toEqual([null, null, null]);
    expect(verdicts(after)).toEqual(['agrees', 'differs', 'agrees']);
    expect(show(after, ({ stepsOff }) => stepsOff)).toEqual([null, null, null]);
  });

  it('says nothing about the carry above it', () => {
    const unread = run([set('9'), turn({ result: '01?' })], '005');
    expect(verdicts(unread)).toEqual(['agrees', 'agrees', 'unread']);
    expect(due(unread)).toEqual([false, null, false]);
    expect(made(unread)).toEqual([false, null, null]);
  });

  it('is a whole register where the reading leaves it out', () => {
    const left = run([turn({ result: '000' }), turn({ counter: '007' })]);
    expect(verdicts(left)).toEqual(['unread', 'unread', 'unread']);
    expect(show(left, ({ read }) => read)).toEqual(['?', '?', '?']);
    expect(show(left, ({ verdict }) => verdict, 'counter')).toEqual(['agrees', 'agrees', 'agrees']);
  });

  it('is known again after a clearing', () => {
    const cleared = run([turn({ result: '???' }), { do: 'clear', what: 'result', read: { result: '020' } }]);
    expect(fromLast(cleared)).toEqual([0, 0, 0]);
    expect(verdicts(cleared)).toEqual(['agrees', 'differs', 'agrees']);
    expect(due(cleared)).toEqual([false, false, false]);
  });
});

describe('a wheel between two numerals', () => {
  it('is a fault, and may be either from then on', () => {
    const between = [set('1'), turn({ result: '0 4~ 0' })];
    expect(run(between, '039').firstFault).toEqual({ step: 1, register: 'result', wheel: 2 });
    const next = (result: string) => run([...between, turn({ result })], '039');
    expect(verdicts(next('041'))).toEqual(['agrees', 'agrees', 'agrees']);
    expect(verdicts(next('051'))).toEqual(['agrees', 'agrees', 'agrees']);
    expect(verdicts(next('061'))).toEqual(['agrees', 'differs', 'agrees']);
    expect(run(between, '039').agrees).toBe(false);
  });

  it('between nine and nought is either', () => {
    const nine = run([set('1'), turn({ result: '0 9~ 0' }), turn({ result: '001' })], '089');
    expect(verdicts(nine)).toEqual(['agrees', 'agrees', 'agrees']);
  });
});

describe('an excluded wheel', () => {
  const excluded: Place[] = [{ register: 'result', wheel: 1 }];

  it('counts neither for nor against the machine', () => {
    const wrong = run([set('1'), turn({ result: '005' })], undefined, { excluded });
    expect(verdicts(wrong)).toEqual(['agrees', 'agrees', 'excluded']);
    expect(wrong.agrees).toBe(true);
    expect(show(wrong, ({ read, stepsOff }) => [read, stepsOff])[2]).toEqual(['5', 4]);
  });

  it('may have carried or not', () => {
    for (const result of ['090', '000', '100']) {
      const carried = run([set('1'), turn({ result })], '099', { excluded });
      expect(due(carried)[1]).toBeNull();
      expect(made(carried)[1]).toBeNull();
    }
    expect(run([set('1'), turn({ result: '090' })], '099', { excluded }).agrees).toBe(true);
    expect(run([set('1'), turn({ result: '100' })], '099', { excluded }).agrees).toBe(true);
    expect(run([set('1'), turn({ result: '010' })], '099', { excluded }).agrees).toBe(false);
  });

  it('may have carried only as far as carries reach', () => {
    // At position 1 a carry reaches wheel 2 and no further, at position 2 it reaches wheel 3.
    const short = layoutOf({ ...small, settingSlides: 1, carriagePositions: 2, resultCarry: 1, subtraction: 'none' });
    const middle: Place[] = [{ register: 'result', wheel: 2 }];
    const steps = (result: string): Step[] => [set('0'), turn(), { do: 'shift', to: 2 }, turn({ result })];
    const verdict = (result: string) => verdicts(run(steps(result), '500', { layout: short, excluded: middle }))[0];
    expect(['400', '500', '600', '700'].map(verdict)).toEqual(['differs', 'agrees', 'agrees', 'differs']);
  });

  it('owes nothing where nothing turned', () => {
    const still = run([set('1'), { ...set('2'), read: { result: '099' } }], '099', { excluded });
    expect(fromLast(still)).toEqual([0, 9, 9]);
    expect(due(still)).toEqual([false, false, false]);
  });
});

describe('after a clearing that failed', () => {
  it('a wheel that was left standing is no proof of what the one below it did', () => {
    // Wheel 1 stayed at 7 unread; five more took it past nine, and the carry it made was due.
    const steps: Step[] = [set('7'), turn(), { do: 'clear', what: 'both' }, set('5'), turn({ result: '012' })];
    const judged = run(steps);
    expect(verdicts(judged)).toEqual(['agrees', 'differs', 'differs']);
    expect(due(judged)[1]).toBeNull();
    expect(show(judged, ({ follows }) => follows)).toEqual([false, true, false]);
    expect(judged.firstFault).toMatchObject({ wheel: 1 });
  });
});

describe('the comparer', () => {
  it('tells where a healthy machine stands between readings', () => {
    const comparer = createComparer(layoutOf());
    expect(comparer.take(set('305'))).toBeNull();
    expect(comparer.take({ do: 'shift', to: 3 })).toBeNull();
    expect(comparer.take({ do: 'reverse', on: true })).toBeNull();
    const reading = comparer.take(turn({ result: '30400' }));
    expect(reading).toMatchObject({ step: 3 });
    expect(comparer.standing).toEqual({
      result: '00000030500',
      counter: '999900',
      slides: '00000305',
      carriage: 3,
      reversed: true,
    });
  });

  it('refuses what no door has let through', () => {
    const comparer = createComparer(small);
    expect(() => comparer.take(turn({ result: '1.5' }))).toThrow('Not accepted');
  });

  it('takes more changes of direction than it keeps, and says what it no longer knows', () => {
    const steps = Array.from({ length: 200 }, (_, index) => turn(undefined, 1, index % 2 === 0 ? 'add' : 'subtract'));
    const long = run([set('1'), ...steps, turn({ result: '001' })], '000', { layout: backward });
    expect(verdicts(long)).toEqual(['agrees', 'agrees', 'agrees']);
    expect(due(long)).toEqual([null, null, false]);
    const off = run([set('1'), ...steps, turn({ result: '011' })], '000', { layout: backward });
    expect(verdicts(off)).toEqual(['agrees', 'differs', 'agrees']);
    expect(show(off, ({ follows }) => follows)).toEqual([false, false, false]);
  });

  it('takes an operation apart from its reading', () => {
    expect(operationOf(turn({ result: '001' }))).toEqual({ do: 'turn', way: 'add', times: 1 });
  });
});
