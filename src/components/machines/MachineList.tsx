import {
  getCoreRowModel,
  getFilteredRowModel,
  getPaginationRowModel,
  getSortedRowModel,
  type Table,
  useReactTable,
} from '@tanstack/react-table';
import type { ReactElement } from 'react';
import { byWords, COLUMNS } from './columns';
import { ListFilter } from './ListFilter';
import { ListPages } from './ListPages';
import { ListTable } from './ListTable';
import type { ListRow } from './list-row';
import type { ListView } from './list-view';
import { useListView } from './useListView';
import { counted } from './words';

interface Props {
  readonly rows: readonly ListRow[];
  /** The address's question, as the server got it. */
  readonly search: string;
}

function useMachineTable(rows: readonly ListRow[], view: ListView): Table<ListRow> {
  return useReactTable({
    data: rows as ListRow[],
    columns: COLUMNS,
    getRowId: (row) => row.id,
    state: {
      sorting: [{ id: view.sort, desc: view.falling }],
      globalFilter: view.text.trim(),
      columnFilters: view.state ? [{ id: 'state', value: view.state }] : [],
      pagination: { pageIndex: view.page - 1, pageSize: view.size },
    },
    globalFilterFn: byWords,
    getColumnCanGlobalFilter: (column) => column.id === 'name',
    autoResetPageIndex: false,
    getCoreRowModel: getCoreRowModel(),
    getFilteredRowModel: getFilteredRowModel(),
    getSortedRowModel: getSortedRowModel(),
    getPaginationRowModel: getPaginationRowModel(),
  });
}

/**
 * The machines of a workshop: sorted, filtered and paged in the page, all of it in the address. Its controls are a
 * form and links, so that the server draws the same list for a browser that runs no script.
 */
export function MachineList({ rows, search }: Props): ReactElement {
  const [asked, change] = useListView(search);
  const found = useMachineTable(rows, asked).getFilteredRowModel().rows.length;
  const pages = Math.max(1, Math.ceil(found / asked.size));
  const view = { ...asked, page: Math.min(asked.page, pages) };
  const table = useMachineTable(rows, view);
  return (
    <div className="grid gap-6">
      <ListFilter view={view} change={change} />
      <p role="status" className="text-sm text-ink-soft">
        {found === rows.length ? counted(found, 'machine') : `${found} of ${counted(rows.length, 'machine')}`}
      </p>
      {found > 0 ? (
        <ListTable rows={table.getRowModel().rows} view={view} change={change} />
      ) : (
        <p className="border border-dashed border-rule-firm px-5 py-8">
          No machine is like that.{' '}
          <button type="button" className="link min-h-11" onClick={() => change({ text: '', state: null })}>
            Show all machines
          </button>
        </p>
      )}
      <ListPages view={view} pages={pages} change={change} />
    </div>
  );
}
