/** The columns of a run's CSV file, in the order the writer puts them. The reader takes any order. */
export const CSV_COLUMNS = [
  'step',
  'do',
  'slides',
  'carriage',
  'way',
  'times',
  'reverse',
  'clear',
  'result',
  'counter',
  'time',
  'note',
] as const;
export type CsvColumn = (typeof CSV_COLUMNS)[number];

/** Characters that may stand between fields; the writer always uses the comma. */
export const DELIMITERS = [',', ';', '\t'] as const;
export type Delimiter = (typeof DELIMITERS)[number];

/** Which columns say what was done, for each operation: the reader refuses any other of them in that row. */
export const OPERATION_COLUMNS = {
  set: ['slides'],
  turn: ['way', 'times'],
  shift: ['carriage'],
  reverse: ['reverse'],
  clear: ['clear'],
} as const satisfies Record<string, readonly CsvColumn[]>;

export function isCsvColumn(name: string): name is CsvColumn {
  return (CSV_COLUMNS as readonly string[]).includes(name);
}
