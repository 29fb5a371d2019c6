import type { MouseEvent, ReactElement, ReactNode } from 'react';
import { SelectField } from '@/components/ui/Field';
import { buttonLook } from '@/components/ui/look';
import { paths } from '@/lib/paths';
import { type ListView, readView, SIZES, writeView } from './list-view';
import type { Change } from './useListView';

/** Whether a click on a link is for us, and not for a new tab. */
export function isPlainClick(event: MouseEvent): boolean {
  return event.button === 0 && !event.metaKey && !event.ctrlKey && !event.shiftKey && !event.altKey;
}

const PER_PAGE = SIZES.map((size) => ({ value: String(size), label: `${size} a page` }));

interface Props {
  readonly view: ListView;
  readonly pages: number;
  readonly change: Change;
}

/** The pages of the list, and how many rows each has. */
export function ListPages({ view, pages, change }: Props): ReactElement {
  const to = (page: number, rel: 'prev' | 'next', word: ReactNode): ReactNode =>
    page < 1 || page > pages ? null : (
      <a
        href={`${paths.runs()}${writeView({ ...view, page })}`}
        rel={rel}
        className={buttonLook('quiet')}
        onClick={(event) => {
          if (!isPlainClick(event)) return;
          event.preventDefault();
          change({ page });
        }}
      >
        {word}
      </a>
    );
  return (
    <div className="flex flex-wrap items-end justify-between gap-4">
      <nav aria-label="Pages of the list" className="flex flex-wrap items-center gap-4">
        {to(view.page - 1, 'prev', 'Page before')}
        <span aria-current="page">
          Page {view.page} of {pages}
        </span>
        {to(view.page + 1, 'next', 'Next page')}
      </nav>
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
