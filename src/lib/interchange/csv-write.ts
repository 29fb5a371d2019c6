import { CSV_COLUMNS, type CsvColumn } from './columns';
import { writeMoment } from './moment';
import type { RunStep } from './run-step';

export interface WriteOptions {
  /**
   * Puts an apostrophe before notes that a spreadsheet would run as a formula. A separate form for people who open the
   * file in a spreadsheet: it changes those notes, and the reader does not change them back, because nobody can tell
   * the apostrophe from one the tester typed. For keeping and exchanging a run, leave it off.
   */
  readonly guardFormulas?: boolean | undefined;
}

/** First characters that spreadsheets take for a formula, or skip before one (OWASP, CSV Injection; CWE-1236). */
export const FORMULA_START = /^[=+\-@\t\r\n\0＝＋－＠]/u;

const NEEDS_QUOTES = /[",\r\n]/u;
const LINE_END = '\r\n';

/**
 * Writes a run as the one canonical file of RFC 4180: comma, CRLF, every column in the order of `CSV_COLUMNS`, rows
 * numbered from 1, quotes only where needed, `times` always said. Exact: reading it back gives the same steps.
 */
export function writeRunCsv(steps: readonly RunStep[], options: WriteOptions = {}): string {
  const lines = [CSV_COLUMNS.join(',')];
  steps.forEach((step, index) => {
    const cells = cellsOf(step, index + 1, options);
    lines.push(CSV_COLUMNS.map((column) => quoted(cells[column] ?? '')).join(','));
  });
  return lines.join(LINE_END) + LINE_END;
}

type Cells = Partial<Record<CsvColumn, string | undefined>>;

function cellsOf(step: RunStep, number: number, { guardFormulas = false }: WriteOptions): Cells {
  const note = step.note ?? '';
  return {
    step: String(number),
    do: step.do,
    ...operationCells(step),
    result: step.read?.result,
    counter: step.read?.counter,
    time: step.at && writeMoment(step.at),
    note: guardFormulas && FORMULA_START.test(note) ? `'${note}` : note,
  };
}

function operationCells(step: RunStep): Cells {
  switch (step.do) {
    case 'set':
      return { slides: step.slides };
    case 'turn':
      return { way: step.way, times: String(step.times ?? 1) };
    case 'shift':
      return { carriage: String(step.to) };
    case 'reverse':
      return { reverse: step.on ? 'on' : 'off' };
    case 'clear':
      return { clear: step.what };
  }
}

function quoted(cell: string): string {
  return NEEDS_QUOTES.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
