import { describe, expect, it } from 'vitest';
import cases from '../../../fixtures/golden/compare.json' with { type: 'json' };
import { acceptRun } from '../mechanism/accept';
import { acceptLayout, type LayoutDescription } from '../mechanism/layout';
import { compare, type LadderWheel } from './compare';

const highestFirst = (wheels: readonly LadderWheel[], show: (wheel: LadderWheel) => string | number | null): string =>
  wheels.map(show).reverse().join('');

const missedIn = (wheels: readonly LadderWheel[]): number[] =>
  wheels.filter(({ carryDue, carryMade }) => carryDue === true && carryMade === false).map(({ wheel }) => wheel);

/** Runs with one missed carry now and then, worked out by another program; see fixtures/README.md. */
describe('golden comparisons', () => {
  it('are all there', () => {
    expect(cases).toHaveLength(12);
  });

  it.each(cases.map(({ body, readings }, index) => ({ index, body, readings })))('run $index', ({ body, readings }) => {
    const layout = acceptLayout(body.layout as LayoutDescription);
    if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
    const run = acceptRun(layout.value, body);
    if (!run.ok) throw new Error(JSON.stringify(run.problems));
    const comparison = compare(run.value);
    const judged = comparison.readings.map(({ step, result, counter }) => {
      const missed = missedIn(result);
      expect(missedIn(counter)).toEqual([]);
      return {
        step,
        expected: {
          result: highestFirst(result, ({ expected }) => expected),
          counter: highestFirst(counter, ({ expected }) => expected),
        },
        expectedFromLast: {
          result: highestFirst(result, ({ expectedFromLast }) => expectedFromLast),
          counter: highestFirst(counter, ({ expectedFromLast }) => expectedFromLast),
        },
        read: { result: highestFirst(result, ({ read }) => read), counter: highestFirst(counter, ({ read }) => read) },
        missed: missed.length === 0 ? null : missed.length === 1 ? missed[0] : missed,
      };
    });
    expect(judged).toEqual(readings);
    const first = readings.find(({ missed }) => missed !== null);
    const place = first ? { step: first.step, register: 'result', wheel: first.missed } : null;
    expect(comparison.firstFault).toEqual(place);
  });
});
