import { describe, expect, it } from 'vitest';
import { moveFor, type Standpoint } from './moves';

const at = (active: number | null, more: Partial<Standpoint> = {}): Standpoint => ({
  active,
  last: 99,
  faults: [3, 40, 41],
  ...more,
});
const press = (key: string, from: Standpoint, ctrlKey = false): number | null | undefined =>
  moveFor({ key, ctrlKey, metaKey: false, altKey: false }, from);

describe('keys of the ladder', () => {
  it.each<[string, number | null, number | null | undefined]>([
    ['ArrowDown', null, 0],
    ['ArrowDown', 4, 5],
    ['ArrowDown', 99, 99],
    ['ArrowUp', null, 99],
    ['ArrowUp', 0, 0],
    ['PageDown', null, 9],
    ['PageDown', 95, 99],
    ['PageUp', null, 90],
    ['PageUp', 4, 0],
    ['Home', 50, 0],
    ['End', 50, 99],
    ['n', null, 3],
    ['n', 3, 40],
    ['N', 40, 41],
    ['n', 41, undefined],
    ['p', null, 41],
    ['p', 41, 40],
    ['p', 3, undefined],
    ['Enter', null, 0],
    ['Enter', 7, 7],
    ['Escape', 7, null],
    ['Escape', null, undefined],
    ['x', 7, undefined],
  ])('%s from %s leads to %s', (key, active, expected) => {
    expect(press(key, at(active))).toBe(expected);
  });

  it('leaves the keys of the browser and the device alone', () => {
    expect(press('p', at(0), true)).toBeUndefined();
  });

  it('goes nowhere in an empty ladder', () => {
    expect(press('ArrowDown', at(null, { last: -1, faults: [] }))).toBeUndefined();
  });
});
