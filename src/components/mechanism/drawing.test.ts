import { describe, expect, it } from 'vitest';
import { acceptLayout, type Layout, type LayoutDescription } from '@/lib/mechanism/layout';
import { createMachine } from '@/lib/mechanism/machine';
import { drawingOf, drawingWords } from './drawing';

function layoutOf(description: LayoutDescription): Layout {
  const accepted = acceptLayout(description);
  if (!accepted.ok) throw new Error('not a layout');
  return accepted.value;
}

describe('drawing of a layout', () => {
  const layouts = [
    layoutOf({}),
    layoutOf({ settingSlides: 11, resultWheels: 15, counterWheels: 8, carriagePositions: 8 }),
    layoutOf({ settingSlides: 3, resultWheels: 2, counterWheels: 1, carriagePositions: 5, subtraction: 'reverse' }),
  ];

  it.each(layouts)('shows as driven what a machine with all slides at 1 moves (%#)', (layout) => {
    for (let position = 1; position <= layout.carriagePositions; position += 1) {
      const machine = createMachine(layout);
      machine.apply({ do: 'set', slides: '1'.repeat(layout.settingSlides) });
      machine.apply({ do: 'shift', to: position });
      const { result, counter } = machine.apply({ do: 'turn', way: 'add' });
      const moved = (register: string): number[] =>
        [...register].reverse().flatMap((digit, index) => (digit === '0' ? [] : [index + 1]));
      const { driven, counting } = drawingOf(layout, position);
      const wheels = driven ? Array.from({ length: driven.to - driven.from + 1 }, (_, i) => driven.from + i) : [];
      expect(wheels).toEqual(moved(result));
      expect(counting === null ? [] : [counting]).toEqual(moved(counter));
    }
  });

  it('stands what works on one another in one column, and all of it inside', () => {
    for (const layout of layouts)
      for (let position = 1; position <= layout.carriagePositions; position += 1) {
        const drawing = drawingOf(layout, position);
        expect(drawing.wheelX(position)).toBe(drawing.slideX(1));
        const xs = [drawing.wheelX(1), drawing.wheelX(layout.resultWheels), drawing.slideX(layout.settingSlides)];
        for (const x of xs) {
          expect(x).toBeGreaterThan(0);
          expect(x).toBeLessThan(drawing.width);
        }
      }
  });

  it('says the same in words', () => {
    expect(drawingWords(layoutOf({ resultCarry: 8 }), 2)).toBe(
      '8 setting slides, 11 result wheels, 6 counter wheels, 6 carriage positions. With the carriage at 2 the slides drive result wheels 2 to 9. A carry reaches result wheels 3 to 10. Subtracting, the complement steps drive wheels 2 to 11. A turn counts on counter wheel 2.',
    );
    expect(drawingWords(layoutOf({ counterWheels: 0, subtraction: 'none' }), 1)).not.toContain('A turn counts');
  });

  it('holds the widest layout', () => {
    const widest = layoutOf({ settingSlides: 32, resultWheels: 32, counterWheels: 32, carriagePositions: 32 });
    expect(drawingOf(widest, 32).columns).toBe(63);
  });
});
