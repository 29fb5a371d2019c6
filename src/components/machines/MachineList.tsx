import {
  getCoreRowModel,
  getFilteredRowModel,
  getSortedRowModel,
  type Row,
  useReactTable,
} from '@tanstack/react-table';
import type { ReactElement } from 'react';
import { ListPages } from '@/components/ui/ListPages';
import { useAddressView } from '@/components/ui/useAddressView';
import { paths } from '@/lib/paths';
import { byWords, COLUMNS } from './columns';
import { ListFilter } from './ListFilter';
import { ListTable } from './ListTable';
import type { ListRow } from './list-row';
import { type ListView, readView, writeView } from './list-view';
import { counted } from './words';

interface Props {
  readonly rows: readonly ListRow[];
  /** The address's question, as the server got it. */
  readonly search: string;
}

const VIEW = { read: readView, write: writeView };

/** The rows that the view leaves, in its order. */
function useRows(rows: readonly ListRow[], view: ListView): readonly Row<ListRow>[] {
  const table = useReactTable({
    data: rows as ListRow[],
    columns: COLUMNS,
    getRowId: (row) => row.id,
    state: {
      sorting: [{ id: view.sort, desc: view.falling }],
      globalFilter: view.text.trim(),
      columnFilters: view.state ? [{ id: 'state', value: view.state }] : [],
    },
    globalFilterFn: byWords,
    getColumnCanGlobalFilter: (column) => column.id === 'name',
    // The page is ours; the table would set its own anew at every change of order, and draw without end.
    autoResetPageIndex: false,
    getCoreRowModel: getCoreRowModel(),
    getFilteredRowModel: getFilteredRowModel(),
    getSortedRowModel: getSortedRowModel(),
  });
  return table.getSortedRowModel().rows;
}

/**
 * The machines of a workshop: sorted, filtered and paged in the page, all of it in the address. Its controls are a
 * form and links, so that the server draws the same list for a browser that runs no script.
 */
export function MachineList({ rows, search }: Props): ReactElement {
  const [asked, change] = useAddressView(search, VIEW);
  const found = useRows(rows, asked);
  const pages = Math.max(1, Math.ceil(found.length / asked.size));
  const view = { ...asked, page: Math.min(asked.page, pages) };
  const shown = found.slice((view.page - 1) * view.size, view.page * view.size);
  return (
    <div className="grid gap-6">
      <ListFilter view={view} change={change} />
      <p role="status" className="text-sm text-ink-soft">
        {found.length === rows.length
          ? counted(rows.length, 'machine')
          : `${found.length} of ${counted(rows.length, 'machine')}`}
      </p>
      {shown.length > 0 ? (
        <ListTable rows={shown} view={view} change={change} />
      ) : (
        <p className="border border-dashed border-rule-firm px-5 py-8">
          No machine is like that.{' '}
          <button type="button" className="link min-h-11" onClick={() => change({ text: '', state: null })}>
            Show all machines
          </button>
        </p>
      )}
      {pages > 1 && (
        <ListPages
          page={view.page}
          pages={pages}
          addressOf={(page) => `${paths.machines}${writeView({ ...view, page })}`}
          onPage={(page) => change({ page })}
        />
      )}
    </div>
  );
}
