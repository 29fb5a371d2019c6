import type { MouseEvent, ReactElement, ReactNode } from 'react';
import { buttonLook } from '@/components/ui/look';
import { paths } from '@/lib/paths';
import { type ListView, writeView } from './list-view';
import type { Change } from './useListView';

/** Whether a click on a link is for us, and not for a new tab. */
export function isPlainClick(event: MouseEvent): boolean {
  return event.button === 0 && !event.metaKey && !event.ctrlKey && !event.shiftKey && !event.altKey;
}

interface Props {
  readonly view: ListView;
  readonly pages: number;
  readonly change: Change;
}

/** The pages of the list; nothing where there is only one. */
export function ListPages({ view, pages, change }: Props): ReactElement | null {
  if (pages < 2) return null;
  const to = (page: number, rel: 'prev' | 'next', word: ReactNode): ReactNode =>
    page < 1 || page > pages ? null : (
      <a
        href={`${paths.machines}${writeView({ ...view, page })}`}
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
    <nav aria-label="Pages of the list" className="flex flex-wrap items-center gap-4">
      {to(view.page - 1, 'prev', 'Page before')}
      <span aria-current="page">
        Page {view.page} of {pages}
      </span>
      {to(view.page + 1, 'next', 'Next page')}
    </nav>
  );
}
