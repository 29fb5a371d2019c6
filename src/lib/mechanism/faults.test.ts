import { describe, expect, it } from 'vitest';
import { acceptFaults } from './accept-faults';
import { FAULT_KINDS, faultDictionary } from './faults';
import { acceptLayout, type Layout, type LayoutDescription } from './layout';

function layoutOf(description: LayoutDescription): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error(JSON.stringify(layout.problems));
  return layout.value;
}

const countOf = (layout: Layout, kind: string): number =>
  faultDictionary(layout).filter((fault) => fault.kind === kind).length;

describe('the dictionary of single faults', () => {
  it('has 207 for the usual layout and 277 for the larger one', () => {
    // Counts given with the mechanism's definition.
    expect(faultDictionary(layoutOf({}))).toHaveLength(207);
    const larger = layoutOf({ settingSlides: 11, resultWheels: 15, counterWheels: 8, carriagePositions: 8 });
    expect(faultDictionary(larger)).toHaveLength(277);
  });

  it('has every kind, in the order of the kinds, and no fault twice', () => {
    const faults = faultDictionary(layoutOf({}));
    expect([...new Set(faults.map(({ kind }) => kind))]).toEqual([...FAULT_KINDS]);
    expect(new Set(faults.map((fault) => JSON.stringify(fault))).size).toBe(207);
  });

  it('follows the layout', () => {
    expect(countOf(layoutOf({ subtraction: 'reverse' }), 'tooth-short')).toBe(9);
    expect(countOf(layoutOf({ carriagePositions: 1 }), 'carriage-off')).toBe(0);
    expect(countOf(layoutOf({ counterWheels: 0 }), 'counter-missed')).toBe(0);
    expect(countOf(layoutOf({ counterWheels: 8, carriagePositions: 3 }), 'counter-missed')).toBe(3);
    expect(countOf(layoutOf({ counterWheels: 0 }), 'clear-missed')).toBe(11);
    expect(countOf(layoutOf({ resultWheels: 1 }), 'carry-missed')).toBe(0);
  });

  it('is let through by the door, on layouts of every kind', () => {
    for (const subtraction of ['complement', 'reverse', 'none'] as const)
      for (const wheels of [0, 1, 32]) {
        const layout = layoutOf({ subtraction, counterWheels: wheels, resultWheels: Math.max(1, wheels) });
        const faults = faultDictionary(layout);
        expect(acceptFaults(layout, faults)).toEqual({ ok: true, value: faults });
      }
  });
});
