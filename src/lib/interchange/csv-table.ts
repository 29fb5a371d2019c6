import Papa from 'papaparse';
import { DELIMITERS, type Delimiter, isCsvColumn } from './columns';
import type { CsvProblemCode } from './problems';

export const LINE_ENDS = ['crlf', 'lf', 'cr', 'mixed', 'none'] as const;
export type LineEnds = (typeof LINE_ENDS)[number];

/** How a file is written, as found: `newline` is `none` for a single line that is not ended. */
export interface Dialect {
  readonly delimiter: Delimiter;
  readonly newline: LineEnds;
  readonly bom: boolean;
}

/** One record of a file. `line` is the physical line it begins on; a quoted line break makes the next one later. */
export interface CsvRecord {
  readonly line: number;
  readonly cells: readonly string[];
  /** Set where the quotes are broken: the cells are then not to be trusted. `line` is that of the opening quote. */
  readonly broken?: { readonly code: CsvProblemCode; readonly line: number };
}

export interface CsvTable {
  readonly dialect: Dialect;
  readonly records: readonly CsvRecord[];
}

const BOM = '\uFEFF';

/** Splits a text into records as RFC 4180 says, with the delimiter and line ends that the file itself uses. */
export function readTable(text: string): CsvTable {
  const bom = text.startsWith(BOM);
  const body = bom ? text.slice(1) : text;
  const lineEnd = !body.includes('\n') && body.includes('\r') ? '\r' : '\n';
  const delimiter = findDelimiter(body.slice(0, endOfFirstLine(body)));
  const records: CsvRecord[] = [];
  const ends = new Set<LineEnds>();
  let from = 0;
  let line = 1;
  const brokenAt = (error: Papa.ParseError | undefined): Pick<CsvRecord, 'broken'> => {
    if (!error) return {};
    const code = error.code === 'MissingQuotes' ? 'quote-not-closed' : 'quote-misplaced';
    return { broken: { code, line: line + count(body.slice(from, error.index ?? from), lineEnd) } };
  };
  const take = (cells: string[], error: Papa.ParseError | undefined, to: number): void => {
    const raw = body.slice(from, to);
    const end = lineEndOf(raw);
    if (end !== 'none') ends.add(end);
    // A text that ends with a line end has no further record after it.
    if (raw !== '')
      records.push({
        line,
        cells: withoutReturn(cells, raw),
        ...brokenAt(error),
      });
    line += count(raw, lineEnd);
    from = to;
  };
  Papa.parse<string[]>(body, {
    delimiter,
    newline: lineEnd,
    step: ({ data, errors, meta }) => take(data, errors[0], meta.cursor),
  });
  return { dialect: { delimiter, newline: onlyOne(ends), bom }, records };
}

/** The delimiter that makes most known names of the header line; the comma where none does better. */
function findDelimiter(header: string): Delimiter {
  const known = (delimiter: Delimiter): number =>
    header.split(delimiter).filter((name) => isCsvColumn(name.replaceAll('"', '').trim().toLowerCase())).length;
  const pieces = (delimiter: Delimiter): number => header.split(delimiter).length;
  return [...DELIMITERS].sort((a, b) => known(b) - known(a) || pieces(b) - pieces(a))[0] ?? ',';
}

function endOfFirstLine(text: string): number {
  const at = text.search(/[\r\n]/u);
  return at < 0 ? text.length : at;
}

function lineEndOf(raw: string): LineEnds {
  if (raw.endsWith('\r\n')) return 'crlf';
  if (raw.endsWith('\n')) return 'lf';
  return raw.endsWith('\r') ? 'cr' : 'none';
}

/**
 * Records are split at LF, so that a file of mixed line ends needs no guess; the CR before it is then taken off the
 * last cell, except where the cell was quoted (the parser has dropped it already, and a CR in the cell is data).
 */
function withoutReturn(cells: string[], raw: string): string[] {
  const last = cells.at(-1);
  if (!raw.endsWith('\r\n') || !last?.endsWith('\r')) return cells;
  if (raw.endsWith(`"${last.replaceAll('"', '""')}"\r\n`)) return cells;
  return [...cells.slice(0, -1), last.slice(0, -1)];
}

function count(text: string, piece: string): number {
  let found = 0;
  for (let at = text.indexOf(piece); at >= 0; at = text.indexOf(piece, at + 1)) found += 1;
  return found;
}

function onlyOne(ends: ReadonlySet<LineEnds>): LineEnds {
  const [first, second] = ends;
  return second ? 'mixed' : (first ?? 'none');
}
