import type { Layout } from '../mechanism/layout';
import type { CsvColumn } from './columns';
import { type Header, readHeader } from './csv-header';
import { RowReader } from './csv-row';
import { type CsvRecord, type Dialect, readTable } from './csv-table';
import { CSV_LIMITS } from './limits';
import type { CsvProblem, CsvRemark, CsvRemarkCode } from './problems';
import type { RunStep } from './run-step';
import { inWords } from './understood';

/** A row that was understood. */
export interface RunRow {
  /** The physical line that the row begins on. */
  readonly line: number;
  readonly step: RunStep;
  /** The step in plain words. */
  readonly understood: string;
  readonly remarks: readonly CsvRemark[];
}

/** A file as understood: `rows` holds the good rows only, and may be taken over only where `problems` is empty. */
export interface RunFile {
  readonly dialect: Dialect;
  /** Remarks on the file as a whole; those on a row stand with the row. */
  readonly remarks: readonly CsvRemark[];
  readonly rows: readonly RunRow[];
  /** Everything wrong in the file, in the order of its lines. */
  readonly problems: readonly CsvProblem[];
}

/** Reads a run's file for a machine of this layout. Never throws and never stops at the first thing wrong. */
export function readRunCsv(text: string, layout: Layout): RunFile {
  const { dialect, records } = readTable(text);
  const [first, ...rest] = records;
  const remarks = dialectRemarks(dialect);
  if (!first || isBlank(first))
    return {
      dialect,
      remarks,
      rows: [],
      problems: [{ line: 1, column: null, code: 'empty-file' }],
    };
  if (first.broken)
    return {
      dialect,
      remarks,
      rows: [],
      problems: [brokenQuotes(first, first.broken)],
    };
  const header = readHeader(first.cells, first.line);
  const body = readRows(rest, header, layout);
  remarks.push(...header.remarks);
  if (body.rows.length === 0 && body.problems.length === 0) remarks.push({ line: null, column: null, code: 'no-rows' });
  return { dialect, remarks: remarks.concat(body.remarks), rows: body.rows, problems: body.problems };
}

function readRows(records: readonly CsvRecord[], header: Header, layout: Layout): Omit<RunFile, 'dialect'> {
  const rows: RunRow[] = [];
  const problems: CsvProblem[] = [...header.problems];
  const remarks: CsvRemark[] = [];
  const order = new RowOrder();
  let taken = 0;
  for (const [index, record] of records.entries()) {
    const { line } = record;
    if (problems.length > CSV_LIMITS.problems) break;
    if (record.broken) problems.push(brokenQuotes(record, record.broken));
    else if (isBlank(record)) remarks.push(...blankRows(records, index));
    else if (++taken > CSV_LIMITS.rows) {
      problems.push({ line, column: null, code: 'too-many', expected: String(CSV_LIMITS.rows) });
      break;
    } else if (record.cells.length !== header.width) problems.push(wrongCount(record, header.width));
    else {
      const row = new RowReader(line, cellsBy(record, header), layout);
      order.check(row);
      const step = row.step();
      order.checkTime(row, step);
      problems.push(...row.problems);
      if (step) rows.push({ line, step, understood: inWords(step), remarks: row.remarks });
      else remarks.push(...row.remarks);
    }
  }
  return { rows, problems: cut(problems), remarks };
}

/** At most so many problems, and one more that says there are more. */
function cut(problems: readonly CsvProblem[]): readonly CsvProblem[] {
  const { problems: most } = CSV_LIMITS;
  if (problems.length <= most) return problems;
  const { line } = problems[most] ?? { line: null };
  return [...problems.slice(0, most), { line, column: null, code: 'more-problems', expected: String(most) }];
}

/** One remark for empty rows that follow one another, at the first of them. */
function blankRows(records: readonly CsvRecord[], index: number): CsvRemark[] {
  const blankAt = (at: number): boolean => {
    const record = records[at];
    return record !== undefined && !record.broken && isBlank(record);
  };
  if (blankAt(index - 1)) return [];
  let after = index + 1;
  while (blankAt(after)) after += 1;
  const line = records[index]?.line ?? null;
  return [{ line, column: null, code: 'blank-row', found: String(after - index) }];
}

/** Row numbers rise, though they may leave gaps or be left out; times ought not to go back. */
class RowOrder {
  private last = 0;
  private lastInstant = '';

  check(row: RowReader): void {
    const number = row.number();
    if (number === null) {
      // A row without a number takes the next one, so that numbers further down must still rise past it.
      if (row.problems.length === 0) this.last += 1;
      return;
    }
    const detail = {
      expected: `${this.last + 1} or more`,
      found: String(number),
    };
    if (number === this.last) row.problem('step', 'step-repeated', detail);
    else if (number < this.last) row.problem('step', 'step-falling', detail);
    else if (number > this.last + 1)
      row.remark('step', 'step-gap', {
        found: String(number),
        became: `${this.last} before it`,
      });
    this.last = Math.max(this.last, number);
  }

  checkTime(row: RowReader, step: RunStep | null): void {
    if (!step?.at) return;
    // Instants are of one form and length, so that they sort as text.
    if (step.at.instant < this.lastInstant) row.remark('time', 'time-goes-back', { found: step.at.instant });
    else this.lastInstant = step.at.instant;
  }
}

function cellsBy({ cells }: CsvRecord, { places }: Header): (column: CsvColumn) => string {
  return (column) => cells[places.get(column) ?? -1] ?? '';
}

function isBlank({ cells }: CsvRecord): boolean {
  return cells.every((cell) => cell.trim() === '');
}

function wrongCount({ line, cells }: CsvRecord, width: number): CsvProblem {
  return {
    line,
    column: null,
    code: 'field-count',
    expected: String(width),
    found: String(cells.length),
  };
}

function brokenQuotes(record: CsvRecord, { code, line }: NonNullable<CsvRecord['broken']>): CsvProblem {
  return {
    line,
    column: null,
    code,
    ...(line !== record.line && {
      found: `in the row that begins on line ${record.line}`,
    }),
  };
}

function dialectRemarks({ bom, delimiter, newline }: Dialect): CsvRemark[] {
  const codes: (CsvRemarkCode | false)[] = [
    bom && 'byte-order-mark',
    delimiter === ';' && 'semicolons',
    delimiter === '\t' && 'tabs',
    newline === 'lf' && 'lf-line-ends',
    newline === 'cr' && 'cr-line-ends',
    newline === 'mixed' && 'mixed-line-ends',
  ];
  return codes.filter((code) => code !== false).map((code) => ({ line: null, column: null, code }));
}
