import type { Fault, FaultKind } from '@/lib/mechanism/faults';
import type { Layout } from '@/lib/mechanism/layout';

/** Faults that the machine on the home page can be given, in the words of the trade. */

/** Where a fault of a kind can sit: a word for the place, and the lowest and highest number of it. */
interface Places {
  readonly word: string;
  readonly from: number;
  readonly to: number;
}

export interface FaultChoice {
  readonly kind: FaultKind;
  readonly words: string;
  places(layout: Layout): Places;
  /** The fault at a place; always acting, so that it is seen at the next turn that could show it. */
  at(place: number): Fault;
}

const wheels = (from: number) => (layout: Layout) => ({ word: 'Wheel', from, to: layout.resultWheels });

export const FAULT_CHOICES: readonly FaultChoice[] = [
  {
    kind: 'carry-missed',
    words: 'Carry pin too short',
    places: (layout) => ({ ...wheels(2)(layout), word: 'Into wheel' }),
    at: (wheel) => ({ kind: 'carry-missed', wheel }),
  },
  {
    kind: 'carry-held',
    words: 'Carry lever stays up',
    places: (layout) => ({ ...wheels(2)(layout), word: 'Into wheel' }),
    at: (wheel) => ({ kind: 'carry-held', wheel }),
  },
  {
    kind: 'wheel-short',
    words: 'Wheel stops one step short',
    places: wheels(1),
    at: (wheel) => ({ kind: 'wheel-short', wheel }),
  },
  {
    kind: 'wheel-over',
    words: 'Wheel one step too far',
    places: wheels(1),
    at: (wheel) => ({ kind: 'wheel-over', wheel }),
  },
  {
    kind: 'wheel-seized',
    words: 'Wheel seized',
    places: wheels(1),
    at: (wheel) => ({ kind: 'wheel-seized', wheel }),
  },
  {
    kind: 'slide-off',
    words: 'Slide gear one step out',
    places: (layout) => ({ word: 'Slide', from: 1, to: layout.settingSlides }),
    at: (slide) => ({ kind: 'slide-off', slide, by: 1 }),
  },
  {
    kind: 'tooth-short',
    words: 'Drum step does not bite',
    places: () => ({ word: 'Step', from: 1, to: 9 }),
    at: (tooth) => ({ kind: 'tooth-short', tooth, drum: 'add' }),
  },
  {
    kind: 'counter-carry-missed',
    words: 'Counter carry not made',
    places: (layout) => ({ word: 'Into counter wheel', from: 2, to: layout.counterWheels }),
    at: (wheel) => ({ kind: 'counter-carry-missed', wheel }),
  },
  {
    kind: 'carriage-off',
    words: 'Carriage one place too high',
    places: (layout) => ({ word: 'At position', from: 1, to: layout.carriagePositions - 1 }),
    at: (position) => ({ kind: 'carriage-off', position, by: 1 }),
  },
];

/** The choice of a kind; null for a kind that is not offered. */
export function choiceOf(kind: string): FaultChoice | null {
  return FAULT_CHOICES.find((choice) => choice.kind === kind) ?? null;
}

/** The number of the place a fault sits at; 0 where it sits at none. */
export function placeOf(fault: Fault): number {
  if ('wheel' in fault) return fault.wheel;
  if ('slide' in fault) return fault.slide;
  if ('tooth' in fault) return fault.tooth;
  return 'position' in fault ? fault.position : 0;
}
