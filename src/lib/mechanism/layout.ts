import { quoted } from './description';
import { accept, type Problem, type Result } from './result';

export const SUBTRACTIONS = ['complement', 'reverse', 'none'] as const;
export type Subtraction = (typeof SUBTRACTIONS)[number];

/** Counts of a layout with the range each may have, in the order they are asked for and drawn. */
export const LAYOUT_COUNTS = {
  settingSlides: { from: 1, to: 32, usual: 8 },
  resultWheels: { from: 1, to: 32, usual: 11 },
  counterWheels: { from: 0, to: 32, usual: 6 },
  carriagePositions: { from: 1, to: 32, usual: 6 },
} as const;
export type LayoutCount = keyof typeof LAYOUT_COUNTS;

/** A machine's layout as somebody describes it: anything may be left out or wrong. */
export interface LayoutDescription {
  readonly settingSlides?: number | undefined;
  readonly resultWheels?: number | undefined;
  readonly counterWheels?: number | undefined;
  readonly carriagePositions?: number | undefined;
  readonly subtraction?: Subtraction | undefined;
  /** Columns that the complement steps reach from the lowest slide up; null = up to the highest result wheel. */
  readonly complementColumns?: number | null | undefined;
  /** Wheels above the lowest driven one that a carry still reaches; null = all. */
  readonly resultCarry?: number | null | undefined;
  readonly counterCarry?: boolean | undefined;
}

declare const accepted: unique symbol;

/** A layout that has passed `acceptLayout`: complete and within limits. Inner code never checks again. */
export interface Layout {
  readonly settingSlides: number;
  readonly resultWheels: number;
  readonly counterWheels: number;
  readonly carriagePositions: number;
  readonly subtraction: Subtraction;
  readonly complementColumns: number | null;
  readonly resultCarry: number | null;
  readonly counterCarry: boolean;
  readonly [accepted]: true;
}

/** The one door from a description to a layout that can be simulated. Missing fields take the usual values. */
export function acceptLayout(description: LayoutDescription): Result<Layout> {
  const problems: Problem[] = [];
  const count = (field: string, value: number, from: number, to: number): number => {
    if (!Number.isInteger(value)) problems.push({ code: 'not-a-whole-number', path: [field], found: quoted(value) });
    else if (value < from || value > to)
      problems.push({ code: 'out-of-range', path: [field], expected: `${from} to ${to}`, found: String(value) });
    return value;
  };
  const named = (field: LayoutCount): number => {
    const { from, to, usual } = LAYOUT_COUNTS[field];
    return count(field, description[field] ?? usual, from, to);
  };
  const reach = (field: 'complementColumns' | 'resultCarry', from: number): number | null => {
    const value = description[field] ?? null;
    return value === null ? null : count(field, value, from, 32);
  };
  const subtraction = description.subtraction ?? 'complement';
  if (!SUBTRACTIONS.includes(subtraction))
    problems.push({
      code: 'not-one-of',
      path: ['subtraction'],
      expected: SUBTRACTIONS.join(', '),
      found: quoted(subtraction),
    });
  const counterCarry = description.counterCarry ?? true;
  if (typeof counterCarry !== 'boolean')
    problems.push({
      code: 'not-one-of',
      path: ['counterCarry'],
      expected: 'true, false',
      found: quoted(counterCarry),
    });
  const layout = {
    settingSlides: named('settingSlides'),
    resultWheels: named('resultWheels'),
    counterWheels: named('counterWheels'),
    carriagePositions: named('carriagePositions'),
    subtraction,
    complementColumns: reach('complementColumns', 1),
    resultCarry: reach('resultCarry', 0),
    counterCarry,
  };
  // The only cast into the accepted type: everything above has been checked.
  return problems.length > 0 ? { ok: false, problems } : accept(layout as unknown as Layout);
}
