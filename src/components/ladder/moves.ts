/** Where the ladder's keys lead. Pure: the component only does what this answers. */

export interface KeyPressed {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
}

export interface Standpoint {
  /** The open row, or null. */
  readonly active: number | null;
  /** Index of the last row; −1 where there is none. */
  readonly last: number;
  /** Indexes of the rows that have a fault of their own, rising. */
  readonly faults: readonly number[];
}

/** Rows that PageUp and PageDown go. */
const PAGE = 10;

export function nextFault({ active, faults }: Standpoint): number | null {
  return faults.find((index) => index > (active ?? -1)) ?? null;
}

export function previousFault({ active, faults }: Standpoint): number | null {
  return faults.findLast((index) => index < (active ?? Number.POSITIVE_INFINITY)) ?? null;
}

/** The row a key leads to, null to close the open one, undefined where the key means nothing here. */
export function moveFor(pressed: KeyPressed, at: Standpoint): number | null | undefined {
  if (pressed.ctrlKey || pressed.metaKey || pressed.altKey || at.last < 0) return undefined;
  const { active, last } = at;
  const within = (index: number): number => Math.min(last, Math.max(0, index));
  switch (pressed.key) {
    case 'ArrowDown':
      return active === null ? 0 : within(active + 1);
    case 'ArrowUp':
      return active === null ? last : within(active - 1);
    case 'PageDown':
      return within((active ?? -1) + PAGE);
    case 'PageUp':
      return within((active ?? last + 1) - PAGE);
    case 'Home':
      return 0;
    case 'End':
      return last;
    case 'n':
    case 'N':
      return nextFault(at) ?? undefined;
    case 'p':
    case 'P':
      return previousFault(at) ?? undefined;
    case 'Enter':
      return active ?? 0;
    case 'Escape':
      return active === null ? undefined : null;
    default:
      return undefined;
  }
}
