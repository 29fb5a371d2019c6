import type { Row } from '@tanstack/react-table';
import type { ReactElement } from 'react';
import { isPlainClick } from '@/components/ui/ListPages';
import { Tag } from '@/components/ui/Tag';
import type { Change as ChangeOf } from '@/components/ui/useAddressView';
import { paths } from '@/lib/paths';
import { MACHINE_STATE_WORDS } from '@/lib/schemas/machines';
import { COLUMNS, FALLING_FIRST, FIGURES } from './columns';
import type { ListRow } from './list-row';
import { type ListView, type Sort, writeView } from './list-view';
import { countWords } from './words';

type Change = ChangeOf<ListView>;

interface Props {
  readonly rows: readonly Row<ListRow>[];
  readonly view: ListView;
  readonly change: Change;
}

/** A column's head: a link that sorts by it, and the other way round where it is sorted by already. */
function Head({ id, word, view, change }: { id: Sort; word: string; view: ListView; change: Change }): ReactElement {
  const sorted = view.sort === id;
  const falling = sorted ? !view.falling : FALLING_FIRST.has(id);
  const order = view.falling ? 'descending' : 'ascending';
  return (
    <th scope="col" className={FIGURES.has(id) ? 'number' : undefined} aria-sort={sorted ? order : undefined}>
      <a
        href={`${paths.machines}${writeView({ ...view, sort: id, falling, page: 1 })}`}
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

function Name({ row }: { row: ListRow }): ReactElement {
  return (
    <th scope="row" className="max-md:block max-md:border-b-0! max-md:pb-0!">
      <a href={row.href} className="link inline-flex min-h-11 items-center font-bold md:min-h-0">
        {row.name}
      </a>
      <span className="block text-sm text-ink-soft">{row.about}</span>
    </th>
  );
}

/** The name of a column in front of its cell, where rows are stacked. */
function Label({ word }: { word: string }): ReactElement {
  return (
    <span className="text-sm text-ink-soft md:hidden" aria-hidden="true">
      {word}
    </span>
  );
}

function LastRun({ run }: { run: ListRow['run'] }): ReactElement {
  if (!run) return <span className="text-ink-soft">none yet</span>;
  return (
    <span>
      <a href={run.href} className="link">
        Run {run.number}
      </a>
      , {run.day}
      <span className="block text-sm">
        {run.wrong && (
          <span className="mr-1 font-bold text-vermilion" aria-hidden="true">
            ×
          </span>
        )}
        {run.words}
      </span>
    </span>
  );
}

const CELL = 'max-md:flex max-md:justify-between max-md:gap-4 max-md:border-b-0! max-md:py-1! max-md:pr-0!';

function MachineRow({ row }: { row: ListRow }): ReactElement {
  return (
    <tr className="max-md:block max-md:border-b max-md:border-rule max-md:pb-3">
      <Name row={row} />
      <td className={CELL}>
        <Label word="Serial" />
        {row.serial || <span className="text-ink-soft">none</span>}
      </td>
      <td className={CELL}>
        <Label word="State" />
        <Tag tone={row.state === 'accepted' ? 'good' : 'plain'}>{MACHINE_STATE_WORDS[row.state]}</Tag>
      </td>
      <td className={`number ${CELL}`}>
        <Label word="Turns" />
        {countWords(row.turns)}
      </td>
      <td className={`number ${CELL}`}>
        <Label word="Left out" />
        {row.excluded === 0 ? <span className="text-ink-soft">0</span> : row.excluded}
      </td>
      <td className={CELL}>
        <Label word="Last run" />
        <LastRun run={row.run} />
      </td>
    </tr>
  );
}

/** The table; on a narrow window each row is stacked, with the names of the columns in front of the cells. */
export function ListTable({ rows, view, change }: Props): ReactElement {
  return (
    <table className="record max-md:block">
      <caption className="sr-only">Machines of the workshop</caption>
      <thead className="max-md:block">
        <tr className="max-md:flex max-md:flex-wrap">
          {COLUMNS.map(({ id, header }) => (
            <Head key={id} id={id} word={header} view={view} change={change} />
          ))}
        </tr>
      </thead>
      <tbody className="max-md:block">
        {rows.map(({ id, original }) => (
          <MachineRow key={id} row={original} />
        ))}
      </tbody>
    </table>
  );
}
