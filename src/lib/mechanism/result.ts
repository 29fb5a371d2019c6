/**
 * Bad input is a value, not an exception: every door from outside into the core answers with a `Result`,
 * and a throw means a mistake of our own. Words for people are chosen once, at the edge, from the `code`.
 */
export type Result<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problems: Problem[] };

/** One thing wrong with the input: where, what was expected and what was found. `path` is a JSON-pointer-like list. */
export interface Problem {
  readonly code: ProblemCode;
  readonly path: readonly (string | number)[];
  readonly expected?: string;
  readonly found?: string;
}

export const PROBLEM_CODES = [
  'not-a-whole-number',
  'out-of-range',
  'not-one-of',
  'missing',
  'too-many-glyphs',
  'bad-glyph',
  'has-sign',
  'has-decimal-point',
  'has-exponent',
  'digit-beyond-slides',
  'not-in-layout',
  'seed-needed',
  'too-many',
] as const;
export type ProblemCode = (typeof PROBLEM_CODES)[number];

export function accept<T>(value: T): Result<T> {
  return { ok: true, value };
}

export function refuse(...problems: Problem[]): Result<never> {
  return { ok: false, problems };
}
