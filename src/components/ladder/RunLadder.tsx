import { type ReactElement, useMemo } from 'react';
import type { Place } from '@/lib/comparison/compare';
import type { Layout } from '@/lib/mechanism/layout';
import type { Start } from '@/lib/mechanism/steps';
import { Ladder, type LadderProps } from './Ladder';
import { buildRows, type LadderEntry } from './rows';

type Props = Omit<LadderProps, 'rows' | 'layout' | 'excluded'> & {
  readonly layout: Layout;
  readonly entries: readonly LadderEntry[];
  readonly start?: Start | undefined;
  readonly excluded?: readonly Place[];
};

/**
 * The ladder of a run as it is kept: steps and readings go over the wire, and the judgement is made here by the
 * same core as on the server. Judged rows would be fifty times the size.
 */
export function RunLadder({ layout, entries, start, excluded, ...rest }: Props): ReactElement {
  const rows = useMemo(() => buildRows(layout, entries, { start, excluded }), [layout, entries, start, excluded]);
  return <Ladder layout={layout} rows={rows} excluded={excluded} {...rest} />;
}
