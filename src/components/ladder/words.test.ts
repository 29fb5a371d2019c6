import { describe, expect, it } from 'vitest';
import type { LadderWheel } from '@/lib/comparison/compare';
import type { Operation } from '@/lib/mechanism/steps';
import {
  carryMark,
  cellWords,
  operationSentence,
  operationWords,
  readingSentences,
  shortWords,
  wheelSentence,
} from './words';

const plain: LadderWheel = {
  wheel: 2,
  read: '2',
  expected: 2,
  expectedFromLast: 2,
  verdict: 'agrees',
  stepsOff: 0,
  carryDue: false,
  carryMade: false,
  follows: false,
};
const wheel = (change: Partial<LadderWheel>): LadderWheel => ({ ...plain, ...change });
const missed = wheel({ read: '1', verdict: 'differs', stepsOff: -1, carryDue: true });

describe('operations', () => {
  it.each<[Operation, string, string]>([
    [{ do: 'set', slides: '00000305' }, 'set 305', 'slides set to 305'],
    [{ do: 'set', slides: '000' }, 'set 0', 'slides set to 0'],
    [{ do: 'turn', way: 'add' }, 'turn + ×1', 'one turn adding'],
    [{ do: 'turn', way: 'subtract', times: 9 }, 'turn − ×9', '9 turns subtracting'],
    [{ do: 'shift', to: 3 }, 'carriage 3', 'carriage shifted to position 3'],
    [{ do: 'reverse', on: true }, 'reverse on', 'reversing lever thrown'],
    [{ do: 'reverse', on: false }, 'reverse off', 'reversing lever put back'],
    [{ do: 'clear', what: 'both' }, 'clear both', 'result and counter cleared'],
    [{ do: 'clear', what: 'counter' }, 'clear counter', 'counter cleared'],
  ])('%o', (operation, short, long) => {
    expect(operationWords(operation)).toBe(short);
    expect(operationSentence(operation)).toBe(long);
  });
});

describe('carry marks', () => {
  it.each([
    [true, true, 'made'],
    [true, false, 'missed'],
    [false, true, 'unasked'],
    [false, false, null],
    [null, true, null],
    [true, null, null],
  ])('due %s, made %s: %s', (carryDue, carryMade, mark) => {
    expect(carryMark(wheel({ carryDue, carryMade }))).toBe(mark);
  });
});

it('the lowest wheel takes no carry: a step too far is its own', () => {
  const far = wheel({ wheel: 1, read: '3', verdict: 'differs', stepsOff: 1, carryMade: true });
  expect(carryMark(far)).toBeNull();
  expect(wheelSentence('result', far)).toBe('Wheel 1 shows 3, 2 was expected: one step too far.');
});

describe('a cell read out', () => {
  it.each<[LadderWheel, string]>([
    [missed, 'wheel 2: 1, expected 2, carry missed'],
    [wheel({ carryDue: true, carryMade: true }), 'wheel 2: 2, carry made'],
    [wheel({ read: '?', verdict: 'unread' }), 'wheel 2: not read'],
    [wheel({ read: '9~', verdict: 'between' }), 'wheel 2: between 9 and 0, expected 2'],
    [wheel({ read: '0', verdict: 'differs', follows: true }), 'wheel 2: 0, expected 2, follows from the wheels below'],
    [wheel({ verdict: 'excluded' }), 'wheel 2: 2, left out'],
  ])('%#', (cell, words) => {
    expect(cellWords('result', cell)).toBe(words);
  });
});

describe('a wheel in a sentence', () => {
  it.each<[LadderWheel, string | null]>([
    [missed, 'Wheel 2 shows 1, 2 was expected: the carry from wheel 1 was due and was not made.'],
    [
      wheel({ read: '3', verdict: 'differs', stepsOff: 1, carryMade: true }),
      'Wheel 2 shows 3, 2 was expected: moved on as by a carry, and wheel 1 had asked for none.',
    ],
    [wheel({ read: '5', verdict: 'differs', stepsOff: 3 }), 'Wheel 2 shows 5, 2 was expected: 3 steps too far.'],
    [
      wheel({ read: '5', verdict: 'differs', stepsOff: null, expectedFromLast: null }),
      'Wheel 2 shows 5: no reading before it allows that.',
    ],
    [wheel({ read: '4~', verdict: 'between' }), 'Wheel 2 stands between 4 and 5; 2 was expected.'],
    [plain, null],
  ])('%#', (cell, sentence) => {
    expect(wheelSentence('result', cell)).toBe(sentence);
  });

  it('names the counter', () => {
    expect(wheelSentence('counter', missed)).toContain('Counter wheel 2 shows 1');
    expect(wheelSentence('counter', missed)).toContain('counter wheel 1 was due');
  });
});

describe('a reading in sentences', () => {
  it('says when all is well, and what was left out or not read', () => {
    const reading = {
      step: 0,
      result: [plain, wheel({ wheel: 3, verdict: 'excluded' }), wheel({ wheel: 4, verdict: 'excluded' })],
      counter: [wheel({ read: '?', verdict: 'unread' })],
    };
    expect(readingSentences(reading)).toEqual([
      'Agrees with what was expected.',
      'Wheels 3 and 4 are left out of the judgement.',
      'The counter was not read.',
    ]);
  });

  it('puts at most two faults into the margin', () => {
    const faults = [2, 3, 4, 5].map((at) => wheel({ wheel: at, read: '9', verdict: 'differs', stepsOff: -3 }));
    expect(shortWords({ step: 0, result: faults, counter: [] })).toBe('2: 3 steps short, 3: 3 steps short and 2 more');
  });
});
