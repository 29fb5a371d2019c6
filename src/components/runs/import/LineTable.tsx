import { type ReactElement, useMemo, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { type Line, needsALook } from './lines';

const PAGE = 100;

function Wrong({ line }: { line: Extract<Line, { is: 'wrong' }> }): ReactElement {
  return (
    <tr>
      <th scope="row" className="number align-baseline">
        {line.line ?? 'file'}
      </th>
      <td className="whitespace-nowrap max-sm:hidden">
        {line.column ?? <span className="text-ink-soft">whole line</span>}
      </td>
      <td>
        <p>
          <span className="mr-2 font-bold text-vermilion">
            <span aria-hidden="true">×</span>
            <span className="sr-only">Wrong: </span>
          </span>
          {line.column && <span className="sm:hidden">{line.column}: </span>}
          {line.said}
        </p>
        <p className="pl-5 text-ink-soft">{line.cure}</p>
      </td>
    </tr>
  );
}

function Understood({ line }: { line: Extract<Line, { is: 'understood' }> }): ReactElement {
  return (
    <tr>
      <th scope="row" className="number align-baseline">
        {line.line}
      </th>
      <td className="max-sm:hidden" />
      <td>
        <p>{line.said}</p>
        {line.note !== '' && <p className="text-ink-soft">Note: {line.note}</p>}
        {line.remarks.map((remark) => (
          <p key={remark} className="text-ink-soft">
            {remark}
          </p>
        ))}
      </td>
    </tr>
  );
}

/** Every row of a file in words, and everything wrong in it, line by line; a hundred at a time. */
export function LineTable({ lines, problems }: { lines: readonly Line[]; problems: number }): ReactElement {
  const [all, setAll] = useState(problems === 0);
  const [page, setPage] = useState(0);
  const shown = useMemo(() => (all ? lines : lines.filter(needsALook)), [all, lines]);
  const pages = Math.max(1, Math.ceil(shown.length / PAGE));
  const at = Math.min(page, pages - 1);
  return (
    <div className="grid gap-3">
      <label className="flex min-h-11 items-center gap-3">
        <input
          type="checkbox"
          className="size-5 accent-verdigris"
          checked={!all}
          onChange={({ target }) => {
            setAll(!target.checked);
            setPage(0);
          }}
        />
        Only lines that need a look ({lines.filter(needsALook).length} of {lines.length})
      </label>
      <table className="record">
        <caption className="sr-only">The file line by line</caption>
        <thead>
          <tr>
            <th scope="col" className="number w-16">
              Line
            </th>
            <th scope="col" className="w-32 max-sm:hidden">
              Column
            </th>
            <th scope="col">As understood, or what is wrong and its cure</th>
          </tr>
        </thead>
        <tbody>
          {shown.slice(at * PAGE, (at + 1) * PAGE).map((line, index) => {
            const key = `${line.line} ${line.is} ${index}`;
            return line.is === 'wrong' ? <Wrong key={key} line={line} /> : <Understood key={key} line={line} />;
          })}
        </tbody>
      </table>
      {shown.length === 0 && <p className="text-ink-soft">No line needs a look.</p>}
      {pages > 1 && (
        <nav aria-label="Pages of the lines" className="flex flex-wrap items-center gap-4">
          <Button variant="quiet" disabled={at === 0} onClick={() => setPage(at - 1)}>
            Lines before
          </Button>
          Page {at + 1} of {pages}
          <Button variant="quiet" disabled={at === pages - 1} onClick={() => setPage(at + 1)}>
            Next lines
          </Button>
        </nav>
      )}
    </div>
  );
}
