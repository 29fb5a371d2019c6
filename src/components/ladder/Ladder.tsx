import './ladder.css';
import './marks.css';
import {
  type KeyboardEvent,
  type MouseEvent,
  type ReactElement,
  useCallback,
  useEffect,
  useId,
  useMemo,
  useRef,
  useState,
} from 'react';
import type { Place } from '@/lib/comparison/compare';
import type { Layout } from '@/lib/mechanism/layout';
import { FaultBar } from './FaultBar';
import { LadderDetail } from './LadderDetail';
import { LadderColumns, LadderHead } from './LadderHead';
import { LadderLine } from './LadderLine';
import { Legend } from './Legend';
import { moveFor } from './moves';
import type { LadderRow } from './rows';
import { type Density, useRowsWindow } from './use-rows-window';
import { operationSentence, readingSentences } from './words';

export interface LadderProps {
  readonly layout: Layout;
  readonly rows: readonly LadderRow[];
  /** Wheels left out of the judgement; their columns are dotted. */
  readonly excluded?: readonly Place[];
  /** Rows are still being added: the newest one is kept in sight, opened and read out. */
  readonly live?: boolean;
  /** `bench` is readable at arm's length; `desk` is for reading at a table. */
  readonly density?: Density;
  /** How high it may grow before it scrolls. `fill` takes the height of what it is put into, which must have one. */
  readonly room?: Room;
  readonly label?: string;
  readonly legend?: 'open' | 'closed' | 'none';
  /** Told when a row is opened. */
  readonly onPick?: (row: LadderRow) => void;
}

export const ROOMS = ['short', 'usual', 'fill'] as const;
export type Room = (typeof ROOMS)[number];

/**
 * Sizes that the columns are fitted for; `ladder.css` has one rule for each. On a narrow screen a small machine
 * shows all its wheels, a larger one its result register, with the counter a swipe away.
 */
function sizeFor({ resultWheels, counterWheels }: Layout): 'xs' | 's' | 'm' | 'l' | 'xl' {
  if (resultWheels + counterWheels <= 12) return 'xs';
  if (resultWheels <= 9) return 's';
  if (resultWheels <= 12) return 'm';
  return resultWheels <= 16 ? 'l' : 'xl';
}

function spoken(row: LadderRow): string {
  const said = row.judged ? readingSentences(row.judged).join(' ') : 'No reading.';
  return `Step ${row.seq}, ${operationSentence(row.operation)}. ${said}`;
}

function Space({ height, columns }: { height: number; columns: number }): ReactElement | null {
  // The height is an attribute, not a style: the page's policy lets no inline style through.
  return height > 0 ? (
    // biome-ignore lint/a11y/noAriaHiddenOnFocusable: nothing in it takes the focus; it only holds rows out of sight.
    <tr className="space" aria-hidden="true">
      <td colSpan={columns} height={height} />
    </tr>
  ) : null;
}

/**
 * Rows of turns by columns of wheels: the product's face, used wherever a run is looked at. A real table, of which
 * only the rows in sight are drawn; arrows, Home, End, N, P, Enter and Escape move in it.
 */
export function Ladder(props: LadderProps): ReactElement {
  const { layout, rows, excluded = [], live = false, density = 'desk', legend = 'closed', onPick } = props;
  const { room = 'usual', label = 'The ladder: turns by wheels' } = props;
  const frame = useRef<HTMLElement>(null);
  const detailId = useId();
  const [picked, setPicked] = useState<number | null>(null);
  const { virtualizer, items, above, below } = useRowsWindow(frame, rows, density);
  const faults = useMemo(() => rows.flatMap(({ faults: count }, index) => (count > 0 ? [index] : [])), [rows]);
  const last = rows.length - 1;
  const active = picked !== null && picked <= last ? picked : live && last >= 0 ? last : null;
  const row = active === null ? null : (rows[active] ?? null);
  const columns = layout.resultWheels + layout.counterWheels + (layout.counterWheels > 0 ? 3 : 2);

  const pick = useCallback(
    (index: number | null) => {
      setPicked(index);
      if (index === null) return;
      virtualizer.scrollToIndex(index, { align: 'auto' });
      const chosen = rows[index];
      if (chosen) onPick?.(chosen);
    },
    [virtualizer, rows, onPick],
  );

  useEffect(() => {
    if (!live || last < 0) return;
    setPicked(null);
    virtualizer.scrollToIndex(last, { align: 'end' });
  }, [live, last, virtualizer]);

  const onKeyDown = (event: KeyboardEvent): void => {
    const move = moveFor(event, { active, last, faults });
    if (move === undefined) return;
    event.preventDefault();
    pick(move);
  };
  const onClick = (event: MouseEvent): void => {
    const line = event.target instanceof Element ? event.target.closest('tr[data-index]') : null;
    if (line instanceof HTMLElement) pick(Number(line.dataset.index));
  };

  return (
    <div className="grid min-h-0">
      {faults.length > 0 && <FaultBar rows={rows} faults={faults} active={active} onPick={pick} />}
      <div className="ladder-frame min-h-0">
        <section
          ref={frame}
          className="ladder"
          data-density={density}
          data-size={sizeFor(layout)}
          data-room={room}
          // biome-ignore lint/a11y/noNoninteractiveTabindex: as above.
          tabIndex={0}
          aria-label={label}
          onKeyDown={onKeyDown}
          onClick={onClick}
        >
          <table aria-rowcount={rows.length + 2}>
            <LadderColumns layout={layout} />
            <LadderHead layout={layout} excluded={excluded} />
            <tbody>
              <Space height={above} columns={columns} />
              {items.map(({ index }) => {
                const line = rows[index];
                return line ? (
                  <LadderLine key={line.seq} layout={layout} row={line} index={index} active={index === active} />
                ) : null;
              })}
              <Space height={below} columns={columns} />
            </tbody>
          </table>
        </section>
      </div>
      <div className="border border-t-0 border-ink bg-leaf">
        {row && (
          <section id={detailId} aria-label={`Step ${row.seq} in detail`} className="print:hidden">
            <LadderDetail row={row} />
          </section>
        )}
        {legend !== 'none' && <Legend open={legend === 'open'} />}
      </div>
      <p className="sr-only" role="status">
        {row ? spoken(row) : ''}
      </p>
    </div>
  );
}
