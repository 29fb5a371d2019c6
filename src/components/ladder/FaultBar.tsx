import type { ReactElement } from 'react';
import { nextFault, previousFault, type Standpoint } from './moves';
import type { LadderRow } from './rows';

interface Props {
  readonly rows: readonly LadderRow[];
  readonly faults: readonly number[];
  readonly active: number | null;
  readonly onPick: (index: number) => void;
}

const STEP =
  'min-h-11 border-l border-ink px-4 text-sm hover:bg-verdigris-wash disabled:text-ink-soft disabled:hover:bg-transparent';

/** How many rows have a fault, and the way from one to the next for a finger or a mouse. */
export function FaultBar({ rows, faults, active, onPick }: Props): ReactElement {
  const at: Standpoint = { active, last: rows.length - 1, faults };
  const previous = previousFault(at);
  const next = nextFault(at);
  return (
    <div className="flex flex-wrap items-stretch border border-b-0 border-ink bg-leaf print:hidden">
      <p className="flex min-h-11 flex-1 items-center gap-2.5 px-3 text-sm">
        <span className="turn-flag shrink-0" aria-hidden="true" />
        {faults.length === 1 ? 'One row with a fault' : `${faults.length} rows with faults`}
      </p>
      <button type="button" className={STEP} disabled={previous === null} onClick={() => onPick(previous ?? 0)}>
        Previous<span className="sr-only"> fault</span>
      </button>
      <button type="button" className={STEP} disabled={next === null} onClick={() => onPick(next ?? 0)}>
        Next<span className="sr-only"> fault</span>
      </button>
    </div>
  );
}
