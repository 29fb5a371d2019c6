import { memo, type ReactElement } from 'react';
import type { LadderWheel } from '@/lib/comparison/compare';
import type { Layout } from '@/lib/mechanism/layout';
import type { Register } from '@/lib/mechanism/steps';
import type { LadderRow } from './rows';
import { WheelCell } from './WheelCell';
import { shortWords } from './words';

function Wheels({ register, wheels }: { register: Register; wheels: readonly LadderWheel[] }): ReactElement[] {
  const top = wheels.length;
  return wheels
    .map((wheel) => (
      <WheelCell
        key={wheel.wheel}
        register={register}
        wheel={wheel}
        third={wheel.wheel % 3 === 0 && wheel.wheel !== top}
      />
    ))
    .reverse();
}

/** What the margin says of a row: its faults in a few words, then what was noted. */
function Margin({ row }: { row: LadderRow }): ReactElement {
  const fault = row.judged && row.faults > 0 ? shortWords(row.judged) : '';
  const remarks = [row.withdrawn ? 'taken back' : '', row.corrections.length > 0 ? 'corrected' : '', row.note];
  const remark = remarks.filter(Boolean).join('; ');
  return (
    <td className="note">
      {fault && <span className="note-fault">{fault}</span>}
      {fault && remark && '; '}
      {remark}
    </td>
  );
}

function NotRead({ wheels }: { wheels: number }): ReactElement {
  return (
    <td colSpan={wheels}>
      <span className="sr-only">no reading</span>
    </td>
  );
}

interface Props {
  readonly layout: Layout;
  readonly row: LadderRow;
  /** Place among the rows, from 0. */
  readonly index: number;
  readonly active: boolean;
}

/** One row of the ladder. Rows never change once made, so a scrolled ladder redraws only the ones that come in. */
export const LadderLine = memo(function LadderLine({ layout, row, index, active }: Props): ReactElement {
  const { judged } = row;
  const kind = judged ? 'reading' : row.withdrawn ? 'bare withdrawn' : 'bare';
  return (
    <tr
      className={kind}
      aria-rowindex={index + 3}
      aria-current={active ? 'true' : undefined}
      data-index={index}
      data-active={active ? '' : undefined}
      data-fifth={row.seq % 5 === 0 ? '' : undefined}
    >
      <th scope="row" className="turn">
        <span className="turn-in">
          <span className="turn-seq">{row.seq}</span>
          <span className="turn-flag-place">
            {row.faults > 0 && (
              <span className="turn-flag">
                <span className="sr-only">{row.faults === 1 ? 'one wheel wrong' : `${row.faults} wheels wrong`}</span>
              </span>
            )}
          </span>
          <span className="turn-words">{row.words}</span>
        </span>
      </th>
      {judged ? <Wheels register="result" wheels={judged.result} /> : <NotRead wheels={layout.resultWheels} />}
      {layout.counterWheels > 0 && <td className="gap" aria-hidden="true" />}
      {layout.counterWheels > 0 &&
        (judged ? <Wheels register="counter" wheels={judged.counter} /> : <NotRead wheels={layout.counterWheels} />)}
      <Margin row={row} />
    </tr>
  );
});
