import type { ReactElement } from 'react';
import { SelectField } from '@/components/ui/Field';
import { ListPages } from '@/components/ui/ListPages';
import type { Change } from '@/components/ui/useAddressView';
import { paths } from '@/lib/paths';
import { type ListView, readView, SIZES, writeView } from './list-view';

const PER_PAGE = SIZES.map((size) => ({ value: String(size), label: `${size} a page` }));

interface Props {
  readonly view: ListView;
  readonly pages: number;
  readonly change: Change<ListView>;
}

/** The pages of the list, and how many rows each has. */
export function ListFoot({ view, pages, change }: Props): ReactElement {
  return (
    <div className="flex flex-wrap items-end justify-between gap-4">
      <ListPages
        page={view.page}
        pages={pages}
        addressOf={(page) => `${paths.runs()}${writeView({ ...view, page })}`}
        onPage={(page) => change({ page })}
      />
      <SelectField
        label="Rows"
        id="find-size"
        required
        options={PER_PAGE}
        value={String(view.size)}
        onChange={({ target }) => change({ size: readView(`?size=${target.value}`).size })}
      />
    </div>
  );
}
