import { CSV_COLUMNS, type CsvColumn, isCsvColumn, OPERATION_COLUMNS } from './columns';
import type { CsvProblem, CsvRemark } from './problems';

/** Where each known column stands in a record, and how many fields a record must have. */
export interface Header {
  readonly places: ReadonlyMap<CsvColumn, number>;
  readonly width: number;
  readonly problems: readonly CsvProblem[];
  readonly remarks: readonly CsvRemark[];
}

const SAYING_WHAT_WAS_DONE: readonly CsvColumn[] = ['do', ...Object.values(OPERATION_COLUMNS).flat()];

/** Reads the header row: known names in any order, whatever their case and the spaces around them. */
export function readHeader(cells: readonly string[], line: number): Header {
  const places = new Map<CsvColumn, number>();
  const problems: CsvProblem[] = [];
  const remarks: CsvRemark[] = [];
  cells.forEach((cell, place) => {
    const name = cell.trim().toLowerCase();
    // A column without a name is named by its place, so that it can be found in the spreadsheet.
    const column = cell.trim() || `(column ${place + 1})`;
    if (!isCsvColumn(name))
      problems.push({
        line,
        column,
        code: 'unknown-column',
        expected: CSV_COLUMNS.join(', '),
        found: cell.trim(),
      });
    else if (places.has(name))
      problems.push({
        line,
        column: name,
        code: 'repeated-column',
        found: cell.trim(),
      });
    else {
      places.set(name, place);
      if (name !== cell)
        remarks.push({
          line,
          column: name,
          code: 'header-tidied',
          found: cell,
          became: name,
        });
    }
  });
  if (!SAYING_WHAT_WAS_DONE.some((column) => places.has(column)))
    problems.push({
      line,
      column: 'do',
      code: 'no-operation-column',
      expected: CSV_COLUMNS.join(', '),
    });
  return { places, width: cells.length, problems, remarks };
}
