import { type ColumnDef, type FilterFn, type SortingFn, sortingFns } from '@tanstack/react-table';
import { MACHINE_STATE_WORDS, MACHINE_STATES } from '@/lib/schemas/machines';
import type { ListRow } from './list-row';
import type { Sort } from './list-view';

const order = new Intl.Collator('en-GB', { numeric: true, sensitivity: 'base' });
const byText: SortingFn<ListRow> = (one, other, column) =>
  order.compare(one.getValue<string>(column), other.getValue<string>(column));

/** Every word that was typed stands somewhere in the name, the serial, the layout or the state. */
export const byWords: FilterFn<ListRow> = ({ original }, _column, text: string) => {
  const within = [original.name, original.serial, original.about, MACHINE_STATE_WORDS[original.state]]
    .join(' ')
    .toLocaleLowerCase('en-GB');
  return text
    .toLocaleLowerCase('en-GB')
    .split(/\s+/u)
    .every((word) => within.includes(word));
};

type Column = ColumnDef<ListRow> & { readonly id: Sort; readonly header: string };

/** Columns in the order they stand. What is sorted first falls only where the newest or the most is looked for. */
export const COLUMNS: Column[] = [
  { id: 'name', header: 'Machine', accessorFn: (row) => row.name, sortingFn: byText },
  { id: 'serial', header: 'Serial', accessorFn: (row) => row.serial, sortingFn: byText },
  {
    id: 'state',
    header: 'State',
    accessorFn: (row) => row.state,
    sortingFn: (one, other) =>
      MACHINE_STATES.indexOf(one.original.state) - MACHINE_STATES.indexOf(other.original.state),
    filterFn: 'equalsString',
  },
  { id: 'turns', header: 'Turns', accessorFn: (row) => row.turns, sortingFn: sortingFns.basic },
  { id: 'excluded', header: 'Left out', accessorFn: (row) => row.excluded, sortingFn: sortingFns.basic },
  { id: 'run', header: 'Last run', accessorFn: (row) => row.run?.startedAt ?? '', sortingFn: sortingFns.basic },
];

/** Columns of figures, aligned at the right. */
export const FIGURES: ReadonlySet<string> = new Set<Sort>(['turns', 'excluded']);
/** Columns that are first sorted with the most or the newest on top. */
export const FALLING_FIRST: ReadonlySet<string> = new Set<Sort>(['turns', 'excluded', 'run']);
