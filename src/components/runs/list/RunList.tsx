import {
  getCoreRowModel,
  getFilteredRowModel,
  getPaginationRowModel,
  getSortedRowModel,
  type Table,
  useReactTable,
} from '@tanstack/react-table';
import type { ReactElement } from 'react';
import { counted } from '@/components/machines/words';
import { useAddressView } from '@/components/ui/useAddressView';
import { byWords, COLUMNS } from './columns';
import { ListFilter } from './ListFilter';
import { ListFoot } from './ListFoot';
import { ListTable } from './ListTable';
import type { ListRow } from './list-row';
import { type ListView, PLAIN_VIEW, readView, writeView } from './list-view';

interface Props {
  readonly rows: readonly ListRow[];
  readonly machines: readonly { readonly id: string; readonly name: string }[];
  /** The address's question, as the server got it. */
  readonly search: string;
}

const VIEW = { read: readView, write: writeView };

/** What a row must be, beside the words typed; these choices have no columns of their own. */
function chosen(rows: readonly ListRow[], { machine, state, trouble }: ListView): ListRow[] {
  return rows.filter(
    (row) =>
      (machine === null || row.machineId === machine) &&
      (state === null || row.state === state) &&
      (trouble === null || row.trouble === trouble),
  );
}

function useRunTable(rows: ListRow[], view: ListView): Table<ListRow> {
  return useReactTable({
    data: rows,
    columns: COLUMNS,
    getRowId: (row) => row.id,
    state: {
      // Runs that are alike in the chosen column stand latest first.
      sorting: [
        { id: view.sort, desc: view.falling },
        { id: 'started', desc: view.sort === 'started' ? view.falling : true },
        { id: 'number', desc: view.sort === 'number' ? view.falling : true },
      ],
      globalFilter: view.text.trim(),
      pagination: { pageIndex: view.page - 1, pageSize: view.size },
    },
    globalFilterFn: byWords,
    getColumnCanGlobalFilter: (column) => column.id === 'title',
    autoResetPageIndex: false,
    getCoreRowModel: getCoreRowModel(),
    getFilteredRowModel: getFilteredRowModel(),
    getSortedRowModel: getSortedRowModel(),
    getPaginationRowModel: getPaginationRowModel(),
  });
}

/**
 * The runs of a workshop: sorted, filtered and paged in the page, all of it in the address. Its controls are a form and
 * links, so that the server draws the same list for a browser that runs no script.
 */
export function RunList({ rows, machines, search }: Props): ReactElement {
  const [asked, change] = useAddressView(search, VIEW);
  const data = chosen(rows, asked);
  const found = useRunTable(data, asked).getFilteredRowModel().rows.length;
  const pages = Math.max(1, Math.ceil(found / asked.size));
  const view = { ...asked, page: Math.min(asked.page, pages) };
  const table = useRunTable(data, view);
  return (
    <div className="grid gap-6">
      <ListFilter view={view} machines={machines} change={change} />
      <p role="status" className="text-sm text-ink-soft">
        {found === rows.length ? counted(found, 'run') : `${found} of ${counted(rows.length, 'run')}`}
      </p>
      {found > 0 ? (
        <ListTable rows={table.getRowModel().rows} view={view} change={change} />
      ) : (
        <p className="border border-dashed border-rule-firm px-5 py-8">
          No run is like that.{' '}
          <button type="button" className="link min-h-11" onClick={() => change(PLAIN_VIEW)}>
            Show all runs
          </button>
        </p>
      )}
      <ListFoot view={view} pages={pages} change={change} />
    </div>
  );
}
