import type { Layout } from '@/lib/mechanism/layout';

/**
 * Where everything stands in the drawing of a layout, in the drawing's own units. The body with its slides stands
 * still; the carriage with both registers moves to the right, one column a position, so that what stands in one
 * column works on one another. Pure geometry, drawn by `LayoutDrawing`.
 */

/** Width of a column; everything else is measured in it. */
export const COLUMN = 30;

export interface Reach {
  /** Wheels from and to, 1 = units; null where none is reached. */
  readonly from: number;
  readonly to: number;
}

export interface Drawing {
  readonly columns: number;
  readonly width: number;
  /** Middle of the column of the lowest slide. */
  readonly unitsX: number;
  /** Result wheels that the slides drive at this position. */
  readonly driven: Reach | null;
  /** Result wheels that the complement steps drive when subtracting; null where the layout has none. */
  readonly complement: Reach | null;
  /** Result wheels that a carry reaches. */
  readonly carried: Reach | null;
  /** The counter wheel that a turn moves; null where there is none at this position. */
  readonly counting: number | null;
  slideX(slide: number): number;
  wheelX(wheel: number): number;
  positionX(position: number): number;
}

function reach(from: number, to: number): Reach | null {
  return from <= to ? { from, to } : null;
}

export function drawingOf(layout: Layout, position: number): Drawing {
  const { settingSlides, resultWheels, counterWheels, carriagePositions } = layout;
  const left = Math.max(settingSlides, resultWheels, counterWheels);
  const columns = left + carriagePositions - 1;
  const unitsX = (left - 0.5) * COLUMN;
  const lowest = position;
  const columnsDriven = layout.complementColumns ?? resultWheels;
  return {
    columns,
    width: columns * COLUMN,
    unitsX,
    driven: reach(lowest, Math.min(resultWheels, lowest + settingSlides - 1)),
    complement:
      layout.subtraction === 'complement' ? reach(lowest, Math.min(resultWheels, lowest + columnsDriven - 1)) : null,
    carried: reach(
      lowest + 1,
      layout.resultCarry === null ? resultWheels : Math.min(resultWheels, lowest + layout.resultCarry),
    ),
    counting: position <= counterWheels ? position : null,
    slideX: (slide) => unitsX - (slide - 1) * COLUMN,
    wheelX: (wheel) => unitsX + (position - wheel) * COLUMN,
    positionX: (at) => unitsX + (at - 1) * COLUMN,
  };
}

const plural = (count: number, noun: string): string => `${count} ${noun}${count === 1 ? '' : 's'}`;

function span({ from, to }: Reach): string {
  return from === to ? `wheel ${from}` : `wheels ${from} to ${to}`;
}

/** The drawing in words, for who cannot see it. */
export function drawingWords(layout: Layout, position: number): string {
  const { driven, carried, complement, counting } = drawingOf(layout, position);
  const sentences = [
    `${plural(layout.settingSlides, 'setting slide')}, ${plural(layout.resultWheels, 'result wheel')}, ${plural(layout.counterWheels, 'counter wheel')}, ${plural(layout.carriagePositions, 'carriage position')}.`,
    driven
      ? `With the carriage at ${position} the slides drive result ${span(driven)}.`
      : `With the carriage at ${position} the slides drive no result wheel.`,
    carried ? `A carry reaches result ${span(carried)}.` : 'No carry reaches a result wheel.',
  ];
  if (complement) sentences.push(`Subtracting, the complement steps drive ${span(complement)}.`);
  if (layout.subtraction === 'reverse') sentences.push('Subtracting, the wheels turn backward.');
  if (layout.counterWheels > 0)
    sentences.push(
      counting ? `A turn counts on counter wheel ${counting}.` : `No counter wheel counts at position ${position}.`,
    );
  return sentences.join(' ');
}
