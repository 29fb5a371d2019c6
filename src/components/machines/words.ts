import type { Place } from '@/lib/comparison/compare';
import type { LayoutFields } from '@/lib/schemas/layout';
import type { RunResult } from '@/lib/schemas/machine-shapes';

const written = new Intl.NumberFormat('en-GB');

/** A count as people read it: `12,345`. */
export function countWords(count: number): string {
  return written.format(count);
}

/** `1 turn`, `2 turns`. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${countWords(count)} ${count === 1 ? one : many}`;
}

/** `result wheel 2` */
export function placeWords({ register, wheel }: Place): string {
  return `${register} wheel ${wheel}`;
}

/** What came of a run, in a line. */
export function runWords(run: Pick<RunResult, 'readings' | 'disagreeing' | 'firstFault'>): string {
  if (run.readings === 0) return 'nothing read yet';
  if (run.disagreeing === 0) return `${counted(run.readings, 'reading')}, all agree`;
  const share =
    run.readings === 1
      ? 'the one reading differs'
      : `${countWords(run.disagreeing)} of ${counted(run.readings, 'reading')} differ`;
  return run.firstFault ? `${share}, first at step ${run.firstFault.seq}, ${placeWords(run.firstFault)}` : share;
}

/** A layout's counts in a line, for lists: `8 slides, 11 + 6 wheels, 6 places`. */
export function layoutWords(layout: LayoutFields): string {
  const wheels =
    layout.counterWheels > 0 ? `${layout.resultWheels} + ${layout.counterWheels}` : `${layout.resultWheels}`;
  return `${counted(layout.settingSlides, 'slide')}, ${wheels} wheels, ${counted(layout.carriagePositions, 'place')}`;
}

const SUBTRACTION_WORDS = {
  complement: 'by the nines’ complement',
  reverse: 'turning backward',
  none: 'none',
} as const satisfies Record<LayoutFields['subtraction'], string>;

/** A layout field by field, for a page. */
export function layoutLines(layout: LayoutFields): readonly { readonly name: string; readonly value: string }[] {
  const columns = layout.complementColumns === null ? 'all' : countWords(layout.complementColumns);
  const carry = layout.resultCarry === null ? 'to the highest wheel' : `${counted(layout.resultCarry, 'wheel')} up`;
  const lines = [
    { name: 'Setting slides', value: countWords(layout.settingSlides) },
    { name: 'Result wheels', value: countWords(layout.resultWheels) },
    { name: 'Counter wheels', value: layout.counterWheels === 0 ? 'no counter' : countWords(layout.counterWheels) },
    { name: 'Carriage places', value: countWords(layout.carriagePositions) },
    { name: 'Subtraction', value: SUBTRACTION_WORDS[layout.subtraction] },
  ];
  if (layout.subtraction === 'complement') lines.push({ name: 'Complement columns', value: columns });
  lines.push({ name: 'Result carry reaches', value: carry });
  if (layout.counterWheels > 0) lines.push({ name: 'Counter carry', value: layout.counterCarry ? 'yes' : 'none' });
  return lines;
}

/** A scale in words. */
export function scaleWords(scale: number | null): string {
  return scale === null ? 'not a scaled build' : `${scale} × the original`;
}

/** A day and, when asked, the minute, as the calendar of an IANA zone shows it: `1 Dec 2026, 14:05`. */
export function dateWords(iso: string, zone: string, withTime = false): string {
  return new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    ...(withTime ? { hour: '2-digit', minute: '2-digit' } : {}),
  }).format(new Date(iso));
}
