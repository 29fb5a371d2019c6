import { type ColumnDef, type FilterFn, type SortingFn, sortingFns } from '@tanstack/react-table';
import { type ListRow, RUN_STATE_WORDS, TROUBLE_WORDS, TROUBLES } from './list-row';
import type { Sort } from './list-view';

const order = new Intl.Collator('en-GB', { numeric: true, sensitivity: 'base' });
const byText: SortingFn<ListRow> = (one, other, column) =>
  order.compare(one.getValue<string>(column), other.getValue<string>(column));

/** Every word that was typed stands somewhere in what the row says. */
export const byWords: FilterFn<ListRow> = ({ original: row }, _column, text: string) => {
  const said = [`run ${row.number}`, row.machine, row.title, row.tester, row.words, row.started];
  const within = [...said, RUN_STATE_WORDS[row.state], TROUBLE_WORDS[row.trouble]].join(' ').toLocaleLowerCase('en-GB');
  return text
    .toLocaleLowerCase('en-GB')
    .split(/\s+/u)
    .every((word) => within.includes(word));
};

/** The worst share first: most wrong readings, then those that agree, then those without any. */
const byTrouble: SortingFn<ListRow> = ({ original: one }, { original: other }) =>
  TROUBLES.indexOf(other.trouble) - TROUBLES.indexOf(one.trouble) || one.disagreeing - other.disagreeing;

type Column = ColumnDef<ListRow> & { readonly id: Sort; readonly header: string };

/** Columns in the order they stand. */
export const COLUMNS: Column[] = [
  { id: 'number', header: 'Run', accessorFn: (row) => row.number, sortingFn: sortingFns.basic },
  { id: 'machine', header: 'Machine', accessorFn: (row) => row.machine, sortingFn: byText },
  { id: 'title', header: 'Title', accessorFn: (row) => row.title, sortingFn: byText },
  { id: 'tester', header: 'Tester', accessorFn: (row) => row.tester, sortingFn: byText },
  { id: 'started', header: 'Started', accessorFn: (row) => row.startedAt, sortingFn: sortingFns.basic },
  { id: 'turns', header: 'Turns', accessorFn: (row) => row.turns, sortingFn: sortingFns.basic },
  { id: 'readings', header: 'Readings', accessorFn: (row) => row.readings, sortingFn: sortingFns.basic },
  { id: 'trouble', header: 'Trouble', accessorFn: (row) => row.disagreeing, sortingFn: byTrouble },
];

/** Columns of figures, aligned at the right. */
export const FIGURES: ReadonlySet<string> = new Set<Sort>(['number', 'turns', 'readings']);
/** Columns that are first sorted with the most or the newest on top. */
export const FALLING_FIRST: ReadonlySet<string> = new Set<Sort>(['number', 'started', 'turns', 'readings', 'trouble']);
