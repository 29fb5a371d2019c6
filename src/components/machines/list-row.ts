import { paths } from '@/lib/paths';
import type { MachineSummary } from '@/lib/schemas/machine-shapes';
import type { MachineState } from '@/lib/schemas/machines';
import { dateWords, layoutWords, runWords, scaleWords } from './words';

/** A machine as the list shows it: what is shown, written already, beside what it is sorted by. */
export interface ListRow {
  readonly id: string;
  readonly href: string;
  readonly name: string;
  readonly serial: string;
  readonly about: string;
  readonly state: MachineState;
  readonly turns: number;
  readonly excluded: number;
  readonly run: {
    readonly href: string;
    readonly number: number;
    readonly startedAt: string;
    readonly day: string;
    readonly words: string;
    readonly wrong: boolean;
  } | null;
}

/** Dates are written on the server in the workshop's zone, so that page and island say the same. */
export function listRow(machine: MachineSummary, zone: string): ListRow {
  const { lastRun } = machine;
  const scale = machine.scale === null ? '' : `, ${scaleWords(machine.scale)}`;
  return {
    id: machine.id,
    href: paths.machine(machine.id),
    name: machine.name,
    serial: machine.serial,
    about: `${layoutWords(machine.layout)}${scale}`,
    state: machine.state,
    turns: machine.odometer,
    excluded: machine.openExclusions,
    run: lastRun && {
      href: paths.run(lastRun.id),
      number: lastRun.number,
      startedAt: lastRun.startedAt,
      day: dateWords(lastRun.startedAt, zone),
      words: runWords(lastRun),
      wrong: lastRun.disagreeing > 0,
    },
  };
}
