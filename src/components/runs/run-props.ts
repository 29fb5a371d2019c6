import type { Place } from '@/lib/comparison/compare';
import { acceptLayout, type Layout } from '@/lib/mechanism/layout';
import type { Start } from '@/lib/mechanism/steps';
import type { LayoutFields } from '@/lib/schemas/layout';
import type { RunShown } from '@/lib/schemas/run-shapes';
import { packEntries } from './pack';

/** What the island of a run's page is given: plain values, steps packed. */
export interface RunProps {
  readonly id: string;
  readonly number: number;
  readonly layout: LayoutFields;
  readonly start: Start;
  readonly excluded: readonly Place[];
  readonly packed: string;
  readonly finished: boolean;
  /** Who looks at it: nobody sends what somebody else typed on the same device. */
  readonly person: string;
  /** Zone in which times are written. */
  readonly zone: string;
  readonly mayLog: boolean;
}

export function runProps(run: RunShown, viewer: { person: string; zone: string; mayLog: boolean }): RunProps {
  return {
    id: run.id,
    number: run.number,
    layout: run.layout,
    start: run.start,
    excluded: run.excluded.map(({ register, wheel }) => ({ register, wheel })),
    packed: packEntries(run.entries),
    finished: run.finishedAt !== null,
    ...viewer,
  };
}

/** The layout that a run was logged on; the server gives none that the core would refuse. */
export function layoutOf(fields: LayoutFields): Layout {
  const accepted = acceptLayout(fields);
  if (!accepted.ok) throw new Error('The server gave a layout that is not acceptable.');
  return accepted.value;
}
