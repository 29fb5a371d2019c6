import type { ReactElement } from 'react';
import type { Place } from '@/lib/comparison/compare';
import type { Layout } from '@/lib/mechanism/layout';
import type { Register } from '@/lib/mechanism/steps';

function Positions(props: { register: Register; count: number; excluded: ReadonlySet<number> }): ReactElement[] {
  const { register, count, excluded } = props;
  return Array.from({ length: count }, (_, index) => {
    const wheel = count - index;
    const out = excluded.has(wheel);
    return (
      <th
        key={wheel}
        scope="col"
        className="wheel position"
        data-third={wheel % 3 === 0 && wheel !== count ? '' : undefined}
        data-excluded={out ? '' : undefined}
      >
        <span className="sr-only">{register === 'counter' ? 'counter wheel ' : 'wheel '}</span>
        {wheel}
        {out && <span className="sr-only">, left out</span>}
      </th>
    );
  });
}

interface Props {
  readonly layout: Layout;
  readonly excluded: readonly Place[];
}

/** Widths of the columns: the rows themselves need not be measured. */
export function LadderColumns({ layout }: { layout: Layout }): ReactElement {
  const wheels = (count: number): ReactElement => <col span={count} className="wheel-column" />;
  return (
    <colgroup>
      <col className="turn-column" />
      {wheels(layout.resultWheels)}
      {layout.counterWheels > 0 && (
        <>
          <col className="gap-column" />
          {wheels(layout.counterWheels)}
        </>
      )}
      <col className="note-column" />
    </colgroup>
  );
}

/** Whose columns these are, and the positions in them: 1 = units, at the right. */
export function LadderHead({ layout, excluded }: Props): ReactElement {
  const out = (register: Register): ReadonlySet<number> =>
    new Set(excluded.filter((place) => place.register === register).map(({ wheel }) => wheel));
  return (
    <thead>
      <tr aria-rowindex={1}>
        <th scope="col" rowSpan={2} className="turn">
          Step
        </th>
        <th scope="colgroup" colSpan={layout.resultWheels}>
          Result register
        </th>
        {layout.counterWheels > 0 && (
          <>
            <td className="gap" aria-hidden="true" />
            <th scope="colgroup" colSpan={layout.counterWheels}>
              {layout.counterWheels > 3 ? 'Counter' : <abbr title="Counter">C</abbr>}
            </th>
          </>
        )}
        <th scope="col" rowSpan={2} className="note">
          Remarks
        </th>
      </tr>
      <tr aria-rowindex={2}>
        <Positions register="result" count={layout.resultWheels} excluded={out('result')} />
        {layout.counterWheels > 0 && (
          <>
            <td className="gap" aria-hidden="true" />
            <Positions register="counter" count={layout.counterWheels} excluded={out('counter')} />
          </>
        )}
      </tr>
    </thead>
  );
}
