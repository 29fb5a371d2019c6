import type { Row } from '@tanstack/react-table';
import type { ReactElement, ReactNode } from 'react';
import { countWords } from '@/components/machines/words';
import { isPlainClick } from '@/components/ui/ListPages';
import { Tag } from '@/components/ui/Tag';
import type { Change as ChangeOf } from '@/components/ui/useAddressView';
import { paths } from '@/lib/paths';
import { COLUMNS, FALLING_FIRST, FIGURES } from './columns';
import type { ListRow } from './list-row';
import { type ListView, type Sort, writeView } from './list-view';

type Change = ChangeOf<ListView>;

interface HeadProps {
  readonly id: Sort;
  readonly word: string;
  readonly view: ListView;
  readonly change: Change;
}

/** A column's head: a link that sorts by it, and the other way round where it is sorted by already. */
function Head({ id, word, view, change }: HeadProps): ReactElement {
  const sorted = view.sort === id;
  const falling = sorted ? !view.falling : FALLING_FIRST.has(id);
  const order = view.falling ? 'descending' : 'ascending';
  return (
    <th scope="col" className={FIGURES.has(id) ? 'number' : undefined} aria-sort={sorted ? order : undefined}>
      <a
        href={`${paths.runs()}${writeView({ ...view, sort: id, falling, page: 1 })}`}
        className="inline-flex min-h-11 items-end gap-1 underline-offset-4 hover:underline aria-[current]:font-bold aria-[current]:text-ink"
        aria-current={sorted ? 'true' : undefined}
        onClick={(event) => {
          if (!isPlainClick(event)) return;
          event.preventDefault();
          change({ sort: id, falling });
        }}
      >
        {word}
        <span aria-hidden="true">{sorted ? (view.falling ? '↓' : '↑') : '\u00a0'}</span>
      </a>
    </th>
  );
}

const CELL = 'max-lg:flex max-lg:justify-between max-lg:gap-4 max-lg:border-b-0! max-lg:py-1! max-lg:pr-0!';

/** A cell with the name of its column in front of it, where rows are stacked. */
function Cell({
  word,
  figure = false,
  children,
}: {
  word: string;
  figure?: boolean;
  children: ReactNode;
}): ReactElement {
  return (
    <td className={`${figure ? 'number ' : ''}${CELL}`}>
      <span className="text-sm text-ink-soft lg:hidden" aria-hidden="true">
        {word}
      </span>
      {children}
    </td>
  );
}

function Trouble({ row }: { row: ListRow }): ReactElement {
  if (row.trouble !== 'differs')
    return <span className={row.trouble === 'unread' ? 'text-ink-soft' : ''}>{row.words}</span>;
  return (
    <span className="max-lg:text-right">
      <span className="mr-1.5 font-bold text-vermilion" aria-hidden="true">
        ×
      </span>
      {row.words}
    </span>
  );
}

function RunRow({ row }: { row: ListRow }): ReactElement {
  return (
    <tr className="max-lg:block max-lg:border-b max-lg:border-rule max-lg:pb-3">
      <th scope="row" className="number max-lg:block max-lg:border-b-0! max-lg:pb-0! max-lg:text-left!">
        <a href={row.href} className="link inline-flex min-h-11 items-center font-bold lg:min-h-0">
          <span className="lg:sr-only">Run&nbsp;</span>
          {row.number}
        </a>
      </th>
      <Cell word="Machine">
        <a href={row.machineHref} className="link">
          {row.machine}
        </a>
      </Cell>
      <Cell word="Title">
        <span className="max-lg:text-right">{row.title || <span className="text-ink-soft">none</span>}</span>
      </Cell>
      <Cell word="Tester">{row.tester}</Cell>
      <Cell word="Started">
        <span className="max-lg:text-right">
          <time dateTime={row.startedAt} title={row.startedAt}>
            {row.started}
          </time>
          {row.state === 'open' && (
            <span className="ml-2">
              <Tag>going on</Tag>
            </span>
          )}
        </span>
      </Cell>
      <Cell word="Turns" figure>
        {countWords(row.turns)}
      </Cell>
      <Cell word="Readings" figure>
        {countWords(row.readings)}
      </Cell>
      <Cell word="Trouble">
        <Trouble row={row} />
      </Cell>
    </tr>
  );
}

interface Props {
  readonly rows: readonly Row<ListRow>[];
  readonly view: ListView;
  readonly change: Change;
}

/** The table; on a narrow window each row is stacked, with the names of the columns in front of the cells. */
export function ListTable({ rows, view, change }: Props): ReactElement {
  return (
    <table className="record max-lg:block">
      <caption className="sr-only">Runs of the workshop</caption>
      <thead className="max-lg:block">
        <tr className="max-lg:flex max-lg:flex-wrap">
          {COLUMNS.map(({ id, header }) => (
            <Head key={id} id={id} word={header} view={view} change={change} />
          ))}
        </tr>
      </thead>
      <tbody className="max-lg:block">
        {rows.map(({ id, original }) => (
          <RunRow key={id} row={original} />
        ))}
      </tbody>
    </table>
  );
}
