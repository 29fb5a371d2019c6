import type { Problem, ProblemCode } from './result';

/** Where a field stands in what was described, as a list of names and indexes. */
export type Path = readonly (string | number)[];

/** Something described from outside: named fields, nothing known of any of them. */
export type Plain = Readonly<Record<string, unknown>>;

/** How a value of the wrong kind is quoted back: short, and never by running code of its own. */
export function quoted(value: unknown): string {
  if (typeof value === 'string') return value.slice(0, 60);
  if (typeof value === 'number' || typeof value === 'boolean' || typeof value === 'bigint') return String(value);
  return value === null ? 'null' : Array.isArray(value) ? 'a list' : typeof value;
}

/** The fields of a description, or a problem and null. */
export function plain(found: unknown, path: Path, problems: Problem[]): Plain | null {
  if (typeof found === 'object' && found !== null && !Array.isArray(found)) return found as Plain;
  problems.push({
    code: 'missing',
    path,
    expected: 'an object',
    found: quoted(found),
  });
  return null;
}

/** A whole number that JavaScript holds exactly, or a problem and null. */
export function wholeNumber(found: unknown, path: Path, problems: Problem[]): number | null {
  if (typeof found === 'number' && Number.isSafeInteger(found)) return found;
  problems.push({ code: 'not-a-whole-number', path, found: quoted(found) });
  return null;
}

function text(from: Plain, name: string, path: Path, problems: Problem[]): string | null {
  const found = from[name];
  if (typeof found === 'string') return found;
  problems.push({
    code: 'missing',
    path: [...path, name],
    expected: 'text',
    found: quoted(found),
  });
  return null;
}

function truth(from: Plain, name: string, path: Path, problems: Problem[]): boolean | null {
  const found = from[name];
  if (typeof found === 'boolean') return found;
  problems.push({
    code: 'not-one-of',
    path: [...path, name],
    expected: 'true, false',
    found: quoted(found),
  });
  return null;
}

function oneOf<const T>(from: Plain, name: string, among: readonly T[], path: Path, problems: Problem[]): T | null {
  const found = from[name];
  const known = among.find((one) => one === found);
  if (known !== undefined) return known;
  const code = found === undefined ? 'missing' : 'not-one-of';
  problems.push({
    code,
    path: [...path, name],
    expected: among.join(', '),
    found: quoted(found),
  });
  return null;
}

function count(
  from: Plain,
  name: string,
  least: number,
  most: number,
  code: ProblemCode,
  path: Path,
  problems: Problem[],
): number | null {
  const at = [...path, name];
  const found = from[name];
  if (found === undefined)
    problems.push({
      code: 'missing',
      path: at,
      expected: `${least} to ${most}`,
    });
  const number = found === undefined ? null : wholeNumber(found, at, problems);
  if (number === null || (number >= least && number <= most)) return number;
  const expected = most >= least ? `${least} to ${most}` : 'none';
  problems.push({ code, path: at, expected, found: String(number) });
  return null;
}

/** Readers of one named field each: the value, or a problem added to the list and null. */
export const field = { text, truth, oneOf, count } as const;
