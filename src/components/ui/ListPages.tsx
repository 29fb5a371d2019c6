import type { MouseEvent, ReactElement, ReactNode } from 'react';
import { buttonLook } from './look';

/** Whether a click on a link is for us, and not for a new tab. */
export function isPlainClick(event: MouseEvent): boolean {
  return event.button === 0 && !event.metaKey && !event.ctrlKey && !event.shiftKey && !event.altKey;
}

interface Props {
  readonly page: number;
  readonly pages: number;
  /** Address of a page of the list, for a new tab. */
  readonly addressOf: (page: number) => string;
  readonly onPage: (page: number) => void;
}

/** The pages of a list. */
export function ListPages({ page, pages, addressOf, onPage }: Props): ReactElement {
  const to = (other: number, rel: 'prev' | 'next', word: ReactNode): ReactNode =>
    other < 1 || other > pages ? null : (
      <a
        href={addressOf(other)}
        rel={rel}
        className={buttonLook('quiet')}
        onClick={(event) => {
          if (!isPlainClick(event)) return;
          event.preventDefault();
          onPage(other);
        }}
      >
        {word}
      </a>
    );
  return (
    <nav aria-label="Pages of the list" className="flex flex-wrap items-center gap-4">
      {to(page - 1, 'prev', 'Page before')}
      <span aria-current="page">
        Page {page} of {pages}
      </span>
      {to(page + 1, 'next', 'Next page')}
    </nav>
  );
}
