import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { acceptExcluded, acceptRun, acceptSteps, MOST_STEPS } from './accept';
import { acceptLayout, type Layout, type LayoutDescription } from './layout';
import { PROBLEM_CODES } from './result';

function layoutOf(description: LayoutDescription = {}): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
  return layout.value;
}

const usual = layoutOf();
const noCounter = layoutOf({ counterWheels: 0 });
const addsOnly = layoutOf({ subtraction: 'none' });

const firstProblem = (run: Record<string, unknown>, layout = usual) => {
  const result = acceptRun(layout, { steps: [], ...run });
  return result.ok ? null : result.problems[0];
};

const turn = { do: 'turn', way: 'add' };

describe('the door for steps', () => {
  it('lets good steps through, written out in full', () => {
    const steps = [
      { do: 'set', slides: '3 05', note: 'not ours' },
      { do: 'turn', way: 'add', times: 3, read: { result: '915', counter: '3' } },
      { do: 'turn', way: 'subtract', read: {} },
      { do: 'shift', to: 6 },
      { do: 'reverse', on: true },
      { do: 'clear', what: 'both', read: { result: '? 4~ 0', counter: undefined } },
    ];
    expect(acceptSteps(usual, steps)).toEqual({
      ok: true,
      value: [
        { do: 'set', slides: '00000305' },
        { do: 'turn', way: 'add', times: 3, read: { result: '00000000915', counter: '000003' } },
        { do: 'turn', way: 'subtract', read: {} },
        { do: 'shift', to: 6 },
        { do: 'reverse', on: true },
        { do: 'clear', what: 'both', read: { result: '00000000?4~0' } },
      ],
    });
  });

  it.each<[string, unknown, string, (string | number)[]]>([
    ['a list of nothing', 'steps', 'missing', ['steps']],
    ['no step', [null], 'missing', ['steps', 0]],
    ['a step without a name', [{}], 'missing', ['steps', 0, 'do']],
    ['an unknown step', [{ do: 'fly' }], 'not-one-of', ['steps', 0, 'do']],
    [
      'a digit beyond the slides',
      [turn, { do: 'set', slides: '123456789' }],
      'digit-beyond-slides',
      ['steps', 1, 'slides'],
    ],
    ['slides that are a number', [{ do: 'set', slides: 305 }], 'missing', ['steps', 0, 'slides']],
    ['slides with a sign', [{ do: 'set', slides: '-5' }], 'has-sign', ['steps', 0, 'slides']],
    ['slides with an unread digit', [{ do: 'set', slides: '1?' }], 'bad-glyph', ['steps', 0, 'slides']],
    ['a carriage beyond its positions', [{ do: 'shift', to: 7 }], 'out-of-range', ['steps', 0, 'to']],
    ['a carriage at 0', [{ do: 'shift', to: 0 }], 'out-of-range', ['steps', 0, 'to']],
    ['half a turn', [{ ...turn, times: 0.5 }], 'not-a-whole-number', ['steps', 0, 'times']],
    ['no turns', [{ ...turn, times: 0 }], 'out-of-range', ['steps', 0, 'times']],
    ['too many turns', [{ ...turn, times: 1_000_001 }], 'out-of-range', ['steps', 0, 'times']],
    ['a third way', [{ do: 'turn', way: 'sideways' }], 'not-one-of', ['steps', 0, 'way']],
    ['a lever half thrown', [{ do: 'reverse', on: 'maybe' }], 'not-one-of', ['steps', 0, 'on']],
    ['clearing the slides', [{ do: 'clear', what: 'slides' }], 'not-one-of', ['steps', 0, 'what']],
    [
      'a reading too long',
      [{ ...turn, read: { result: '123456789012' } }],
      'too-many-glyphs',
      ['steps', 0, 'read', 'result'],
    ],
    ['an exponent', [{ ...turn, read: { result: '1.23457E+10' } }], 'has-exponent', ['steps', 0, 'read', 'result']],
    ['a decimal comma', [{ ...turn, read: { counter: '0,1' } }], 'has-decimal-point', ['steps', 0, 'read', 'counter']],
    ['a reading that is a number', [{ ...turn, read: { counter: 1 } }], 'missing', ['steps', 0, 'read', 'counter']],
    ['a reading that is a list', [{ ...turn, read: [] }], 'missing', ['steps', 0, 'read']],
    ['too many steps', Array(MOST_STEPS + 1).fill(turn), 'too-many', ['steps']],
  ])('refuses %s', (_, steps, code, path) => {
    expect(firstProblem({ steps })).toMatchObject({ code, path });
  });

  it('refuses to subtract where the layout does not', () => {
    const steps = [{ do: 'turn', way: 'subtract' }];
    expect(firstProblem({ steps }, addsOnly)).toMatchObject({ code: 'not-in-layout', path: ['steps', 0, 'way'] });
  });

  it('lets a counter that is not there be cleared and reversed: nothing happens', () => {
    const steps = [{ do: 'clear', what: 'counter' }, { do: 'reverse', on: true }, turn];
    expect(acceptRun(noCounter, { steps }).ok).toBe(true);
  });

  it('tells everything that is wrong at once', () => {
    const steps = [{ do: 'fly' }, { do: 'shift', to: 99 }, { ...turn, times: -1, read: { result: '-', counter: 'x' } }];
    const result = acceptSteps(usual, steps);
    expect(result.ok || result.problems.map(({ path }) => path.join('/'))).toEqual([
      'steps/0/do',
      'steps/1/to',
      'steps/2/times',
      'steps/2/read/result',
      'steps/2/read/counter',
    ]);
  });
});

describe('the other doors', () => {
  it.each<[string, Record<string, unknown>, string, (string | number)[]]>([
    ['a start too long', { start: { result: '123456789012' } }, 'too-many-glyphs', ['start', 'result']],
    ['a start not read', { start: { counter: '?' } }, 'bad-glyph', ['start', 'counter']],
    ['a start that is text', { start: '5' }, 'missing', ['start']],
    ['faults that are no list', { faults: {} }, 'missing', ['faults']],
    ['an unknown fault', { faults: [{ kind: 'rust' }] }, 'not-one-of', ['faults', 0, 'kind']],
    ['a carry into wheel 1', { faults: [{ kind: 'carry-missed', wheel: 1 }] }, 'not-in-layout', ['faults', 0, 'wheel']],
    ['a wheel too high', { faults: [{ kind: 'wheel-short', wheel: 12 }] }, 'not-in-layout', ['faults', 0, 'wheel']],
    [
      'a wheel that is text',
      { faults: [{ kind: 'wheel-short', wheel: '3' }] },
      'not-a-whole-number',
      ['faults', 0, 'wheel'],
    ],
    ['a fault nowhere', { faults: [{ kind: 'wheel-short' }] }, 'missing', ['faults', 0, 'wheel']],
    [
      'a slide too high',
      { faults: [{ kind: 'slide-stuck', slide: 9, at: 3 }] },
      'not-in-layout',
      ['faults', 0, 'slide'],
    ],
    [
      'a slide stuck at ten',
      { faults: [{ kind: 'slide-stuck', slide: 1, at: 10 }] },
      'out-of-range',
      ['faults', 0, 'at'],
    ],
    ['a slide off by two', { faults: [{ kind: 'slide-off', slide: 1, by: 2 }] }, 'not-one-of', ['faults', 0, 'by']],
    [
      'a tenth tooth',
      { faults: [{ kind: 'tooth-short', tooth: 10, drum: 'add' }] },
      'out-of-range',
      ['faults', 0, 'tooth'],
    ],
    [
      'a counter wheel never driven',
      { faults: [{ kind: 'counter-missed', wheel: 7 }] },
      'not-in-layout',
      ['faults', 0, 'wheel'],
    ],
    [
      'a carriage off its end',
      { faults: [{ kind: 'carriage-off', position: 6, by: 1 }] },
      'not-in-layout',
      ['faults', 0, 'by'],
    ],
    ['a rate above 1', { faults: [{ kind: 'reverse-dead', rate: 1.5 }] }, 'out-of-range', ['faults', 0, 'rate']],
    [
      'a rate that is none',
      { faults: [{ kind: 'reverse-dead', rate: Number.NaN }] },
      'out-of-range',
      ['faults', 0, 'rate'],
    ],
    ['chance without a seed', { faults: [{ kind: 'reverse-dead', rate: 0.5 }] }, 'seed-needed', ['seed']],
    ['half a seed', { seed: 0.5 }, 'not-a-whole-number', ['seed']],
    [
      'an excluded wheel too high',
      { excluded: [{ register: 'result', wheel: 12 }] },
      'not-in-layout',
      ['excluded', 0, 'wheel'],
    ],
    ['another register', { excluded: [{ register: 'slides', wheel: 1 }] }, 'not-one-of', ['excluded', 0, 'register']],
  ])('refuse %s', (_, run, code, path) => {
    expect(firstProblem(run)).toMatchObject({ code, path });
  });

  it('refuse a drum that the layout does not have', () => {
    const faults = [{ kind: 'tooth-short', tooth: 1, drum: 'subtract' }];
    expect(firstProblem({ faults }, layoutOf({ subtraction: 'reverse' }))).toMatchObject({
      code: 'not-in-layout',
      path: ['faults', 0, 'drum'],
    });
    expect(firstProblem({ faults })).toBeNull();
  });

  it('refuse more turns by chance than can be made while somebody waits, and count all others', () => {
    const steps = Array(6).fill({ ...turn, times: 1_000_000 });
    expect(firstProblem({ steps, faults: [{ kind: 'reverse-dead', rate: 0.5 }], seed: 1 })).toMatchObject({
      code: 'too-many',
      path: ['steps'],
    });
    expect(firstProblem({ steps, faults: [{ kind: 'reverse-dead' }] })).toBeNull();
  });

  it('take what is left out as usual', () => {
    expect(acceptRun(usual, { steps: [] })).toEqual({
      ok: true,
      value: { layout: usual, start: {}, faults: [], steps: [], excluded: [], seed: undefined },
    });
    expect(acceptExcluded(usual, undefined)).toEqual({ ok: true, value: [] });
  });

  it('never throw, and name a known code at a place, whatever comes', () => {
    const word = fc.constantFrom(
      'do',
      'set',
      'turn',
      'slides',
      'kind',
      'wheel',
      'read',
      'result',
      'by',
      'rate',
      'times',
    );
    const anything = fc.anything({ key: word, withBigInt: true, withDate: true, withNullPrototype: true, maxDepth: 3 });
    const step = fc.record(
      {
        do: fc.constantFrom('set', 'turn', 'shift', 'reverse', 'clear'),
        slides: anything,
        way: anything,
        times: anything,
        to: anything,
        on: anything,
        what: anything,
        read: anything,
      },
      { requiredKeys: ['do'] },
    );
    const fault = fc.record(
      {
        kind: fc.constantFrom(
          'carry-missed',
          'slide-off',
          'slide-stuck',
          'tooth-short',
          'clear-missed',
          'carriage-off',
        ),
        wheel: anything,
        slide: anything,
        by: anything,
        at: anything,
        rate: anything,
      },
      { requiredKeys: ['kind'] },
    );
    const run = fc.record({
      start: anything,
      faults: fc.oneof(anything, fc.array(fault)),
      steps: fc.oneof(anything, fc.array(fc.oneof(step, anything))),
      excluded: anything,
      seed: anything,
    });
    fc.assert(
      fc.property(run, (described) => {
        const result = acceptRun(usual, described);
        if (result.ok) return;
        for (const { code, path } of result.problems) {
          expect(PROBLEM_CODES).toContain(code);
          expect(path.length).toBeGreaterThan(0);
        }
      }),
      { numRuns: 1_000 },
    );
  });
});
