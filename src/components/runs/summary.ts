import type { LadderRow } from '@/components/ladder/rows';
import { betweenOf, carryMark, isOwnFault, stepsOffWords } from '@/components/ladder/words';
import type { LadderWheel } from '@/lib/comparison/compare';
import { REGISTERS, type Register } from '@/lib/mechanism/steps';

/** What a run came to, counted over its rows. */
export interface Summary {
  readonly turns: number;
  readonly readings: number;
  /** Readings with a wheel that is wrong. */
  readonly differing: number;
  /** Single readings that were put right. */
  readonly corrected: number;
  readonly takenBack: number;
  /** In words, the first few faults first come. */
  readonly faults: readonly string[];
}

const MOST_FAULTS = 5;
const written = new Intl.NumberFormat('en-GB');

/** `1 turn`, `2,000 turns`. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${written.format(count)} ${count === 1 ? one : many}`;
}

function faultWords(register: Register, wheel: LadderWheel): string {
  const name = register === 'counter' ? 'counter wheel' : 'wheel';
  const below = `${name} ${wheel.wheel - 1}`;
  const mark = carryMark(wheel);
  if (wheel.verdict === 'between') {
    const [lower, upper] = betweenOf(wheel.read);
    return `${name} ${wheel.wheel} stood between ${lower} and ${upper}`;
  }
  if (mark === 'missed') return `${name} ${wheel.wheel} took no carry from ${below}`;
  if (mark === 'unasked') return `${name} ${wheel.wheel} took a carry that ${below} did not ask for`;
  if (wheel.stepsOff !== null) return `${name} ${wheel.wheel} stood ${stepsOffWords(wheel.stepsOff)}`;
  return `${name} ${wheel.wheel} showed ${wheel.read}`;
}

/** Turns made up to and with each row, so that a fault can be told by its turn as well as by its step. */
function turnsOf(row: LadderRow): number {
  return row.withdrawn === null && row.operation.do === 'turn' ? (row.operation.times ?? 1) : 0;
}

function rowFaults(row: LadderRow, turns: number): string[] {
  const { judged } = row;
  if (!judged) return [];
  const place = turnsOf(row) === 0 ? `step ${row.seq}` : `step ${row.seq}, turn ${written.format(turns)}`;
  return REGISTERS.flatMap((register) =>
    judged[register].filter(isOwnFault).map((wheel) => `${place}: ${faultWords(register, wheel)}`),
  );
}

export function summarise(rows: readonly LadderRow[]): Summary {
  let turns = 0;
  let [readings, differing, corrected, takenBack] = [0, 0, 0, 0];
  const faults: string[] = [];
  for (const row of rows) {
    turns += turnsOf(row);
    if (row.withdrawn) takenBack += 1;
    if (row.corrections.length > 0) corrected += 1;
    if (!row.judged) continue;
    readings += 1;
    if (row.faults + row.consequences > 0) differing += 1;
    if (row.faults > 0) faults.push(...rowFaults(row, turns));
  }
  return { turns, readings, differing, corrected, takenBack, faults };
}

/** What it came to in one sentence. */
export function summaryHead({ turns, readings, differing }: Summary): string {
  const made = counted(turns, 'turn');
  if (readings === 0) return turns === 0 ? 'Nothing turned and nothing read yet.' : `${made}, nothing read yet.`;
  const read = `${made}, ${counted(readings, 'reading')}`;
  if (differing === 0) return readings === 1 ? `${read}: it agrees.` : `${read}: all agree.`;
  if (readings === 1) return `${read}: it differs.`;
  return `${read}: ${written.format(differing)} ${differing === 1 ? 'differs' : 'differ'}.`;
}

/** The faults for people, first come first, cut to a few. */
export function summaryFaults({ faults }: Summary): readonly string[] {
  const capital = faults.map((text) => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`);
  if (capital.length <= MOST_FAULTS) return capital;
  return [...capital.slice(0, MOST_FAULTS), `And ${counted(capital.length - MOST_FAULTS, 'more fault')} further down.`];
}
