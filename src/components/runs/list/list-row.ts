import { placeWords } from '@/components/machines/words';
import { paths } from '@/lib/paths';
import type { RunSummary } from '@/lib/schemas/run-shapes';
import { minuteWords } from '../times';

/** How a run stands, for finding it. */
export const RUN_STATES = ['open', 'finished'] as const;
export type RunState = (typeof RUN_STATES)[number];
export const RUN_STATE_WORDS: Record<RunState, string> = { open: 'going on', finished: 'finished' };

/** What came of it, for finding it. */
export const TROUBLES = ['differs', 'agrees', 'unread'] as const;
export type Trouble = (typeof TROUBLES)[number];
export const TROUBLE_WORDS: Record<Trouble, string> = {
  differs: 'a reading differs',
  agrees: 'all readings agree',
  unread: 'nothing read',
};

/** A run as the list shows it: what is shown, written already, beside what it is sorted by. */
export interface ListRow {
  readonly id: string;
  readonly href: string;
  readonly number: number;
  readonly machine: string;
  readonly machineId: string;
  readonly machineHref: string;
  readonly title: string;
  readonly tester: string;
  readonly startedAt: string;
  readonly started: string;
  readonly state: RunState;
  readonly turns: number;
  readonly readings: number;
  readonly disagreeing: number;
  readonly trouble: Trouble;
  readonly words: string;
}

function troubleWords({ readings, disagreeing, firstFault }: RunSummary): string {
  if (readings === 0) return 'nothing read';
  if (disagreeing === 0) return readings === 1 ? 'the one reading agrees' : 'all agree';
  const share = readings === 1 ? 'the one reading differs' : `${disagreeing} of ${readings} differ`;
  return firstFault ? `${share}, first at step ${firstFault.seq}: ${placeWords(firstFault)}` : share;
}

/** Moments are written on the server in the workshop's zone, so that page and island say the same. */
export function listRow(run: RunSummary, zone: string): ListRow {
  return {
    id: run.id,
    href: paths.run(run.id),
    number: run.number,
    machine: run.machine.name,
    machineId: run.machine.id,
    machineHref: paths.machine(run.machine.id),
    title: run.title,
    tester: run.tester.name,
    startedAt: run.startedAt,
    started: minuteWords(run.startedAt, zone),
    state: run.finishedAt === null ? 'open' : 'finished',
    turns: run.turns,
    readings: run.readings,
    disagreeing: run.disagreeing,
    trouble: run.readings === 0 ? 'unread' : run.disagreeing > 0 ? 'differs' : 'agrees',
    words: troubleWords(run),
  };
}
