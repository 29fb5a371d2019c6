import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { acceptLayout, type LayoutDescription } from './layout';

describe('the door for layouts', () => {
  it('takes what is left out as usual', () => {
    expect(acceptLayout({})).toEqual({
      ok: true,
      value: {
        settingSlides: 8,
        resultWheels: 11,
        counterWheels: 6,
        carriagePositions: 6,
        subtraction: 'complement',
        complementColumns: null,
        resultCarry: null,
        counterCarry: true,
      },
    });
  });

  it.each<[Record<string, unknown>, string]>([
    [{ settingSlides: 0 }, 'out-of-range'],
    [{ resultWheels: 33 }, 'out-of-range'],
    [{ counterWheels: -1 }, 'out-of-range'],
    [{ carriagePositions: 1.5 }, 'not-a-whole-number'],
    [{ resultWheels: '11' }, 'not-a-whole-number'],
    [{ complementColumns: 0 }, 'out-of-range'],
    [{ resultCarry: 33 }, 'out-of-range'],
    [{ subtraction: 'borrow' }, 'not-one-of'],
    [{ counterCarry: 'yes' }, 'not-one-of'],
  ])('refuses %j: %s', (description, code) => {
    const path = Object.keys(description);
    expect(acceptLayout(description)).toMatchObject({ ok: false, problems: [{ code, path }] });
  });

  it('takes the smallest and the largest machine, and every reach', () => {
    const least = { settingSlides: 1, resultWheels: 1, counterWheels: 0, carriagePositions: 1, resultCarry: 0 };
    const most = {
      settingSlides: 32,
      resultWheels: 32,
      counterWheels: 32,
      carriagePositions: 32,
      complementColumns: 1,
    };
    for (const description of [least, most]) expect(acceptLayout(description)).toMatchObject({ ok: true });
  });

  it('never throws', () => {
    const field = fc.constantFrom('settingSlides', 'resultWheels', 'subtraction', 'counterCarry', 'resultCarry');
    const described = fc.dictionary(field, fc.anything({ withBigInt: true, withNullPrototype: true }));
    fc.assert(
      fc.property(described, (description) => {
        const result = acceptLayout(description as LayoutDescription);
        expect(result.ok || result.problems.length > 0).toBe(true);
      }),
    );
  });
});
