import type { Layout } from './layout';
import type { Register } from './steps';

/** Every kind of physical cause that the mechanism can be given, in dictionary order. */
export const FAULT_KINDS = [
  'carry-missed',
  'carry-held',
  'wheel-short',
  'wheel-over',
  'wheel-seized',
  'slide-off',
  'slide-stuck',
  'tooth-short',
  'clear-missed',
  'counter-missed',
  'counter-carry-missed',
  'reverse-dead',
  'counter-inverted',
  'carriage-off',
] as const;
export type FaultKind = (typeof FAULT_KINDS)[number];

/** Chance that a fault acts each time it could; left out = 1, always. */
interface Intermittent {
  readonly rate?: number | undefined;
}

/** One physical cause at one place. Wheels, slides and positions count from 1 = units. */
export type Fault = Intermittent &
  (
    | {
        readonly kind: 'carry-missed' | 'carry-held' | 'wheel-short' | 'wheel-over' | 'wheel-seized';
        readonly wheel: number;
      }
    | {
        readonly kind: 'slide-off';
        readonly slide: number;
        readonly by: 1 | -1;
      }
    | {
        readonly kind: 'slide-stuck';
        readonly slide: number;
        readonly at: number;
      }
    | {
        readonly kind: 'tooth-short';
        readonly tooth: number;
        readonly drum: 'add' | 'subtract';
      }
    | {
        readonly kind: 'clear-missed';
        readonly register: Register;
        readonly wheel: number;
      }
    | {
        readonly kind: 'counter-missed' | 'counter-carry-missed';
        readonly wheel: number;
      }
    | { readonly kind: 'reverse-dead' | 'counter-inverted' }
    | {
        readonly kind: 'carriage-off';
        readonly position: number;
        readonly by: 1 | -1;
      }
  );

type Numbers = readonly number[];

/** Whole numbers from `from` to `to`, both included. */
function span(from: number, to: number): Numbers {
  return Array.from({ length: Math.max(0, to - from + 1) }, (_, index) => from + index);
}

const EITHER_WAY = [1, -1] as const;

/** Kinds of fault that sit at a wheel of the result register, with the lowest wheel that can have them. */
export const RESULT_WHEEL_FAULTS = {
  'carry-missed': 2,
  'carry-held': 2,
  'wheel-short': 1,
  'wheel-over': 1,
  'wheel-seized': 1,
} as const;
export type ResultWheelFault = keyof typeof RESULT_WHEEL_FAULTS;

/** Drums that a layout has: a `reverse` subtraction turns the adding drum backward. */
export function drumsOf(layout: Layout): readonly ('add' | 'subtract')[] {
  return layout.subtraction === 'complement' ? ['add', 'subtract'] : ['add'];
}

/** Counter wheels that can be the driven one: there is no carriage position for those further up. */
export function countingWheels(layout: Layout): number {
  return Math.min(layout.counterWheels, layout.carriagePositions);
}

function faultsOfKind(kind: FaultKind, layout: Layout): Fault[] {
  const wheels = span(1, layout.resultWheels);
  const slides = span(1, layout.settingSlides);
  const positions = span(1, layout.carriagePositions);
  switch (kind) {
    case 'carry-missed':
    case 'carry-held':
    case 'wheel-short':
    case 'wheel-over':
    case 'wheel-seized':
      return wheels.filter((wheel) => wheel >= RESULT_WHEEL_FAULTS[kind]).map((wheel) => ({ kind, wheel }));
    case 'slide-off':
      return slides.flatMap((slide) => EITHER_WAY.map((by) => ({ kind, slide, by })));
    case 'slide-stuck':
      return slides.flatMap((slide) => span(0, 9).map((at) => ({ kind, slide, at })));
    case 'tooth-short':
      return drumsOf(layout).flatMap((drum) => span(1, 9).map((tooth) => ({ kind, tooth, drum })));
    case 'clear-missed':
      return [
        ...wheels.map((wheel) => ({
          kind,
          register: 'result' as const,
          wheel,
        })),
        ...span(1, layout.counterWheels).map((wheel) => ({
          kind,
          register: 'counter' as const,
          wheel,
        })),
      ];
    case 'counter-missed':
      return span(1, countingWheels(layout)).map((wheel) => ({ kind, wheel }));
    case 'counter-carry-missed':
      return span(2, layout.counterWheels).map((wheel) => ({ kind, wheel }));
    case 'reverse-dead':
    case 'counter-inverted':
      return [{ kind }];
    case 'carriage-off':
      return positions.flatMap((position) =>
        EITHER_WAY.filter((by) => positions.includes(position + by)).map((by) => ({ kind, position, by })),
      );
  }
}

/**
 * Every single fault that a layout can have, at every place, with rate 1: 207 for the usual layout.
 * A place that exists is listed even where the layout never lets the fault show (a counter carry that the
 * counter does not have): what cannot be shown is for the plan to say, not for the list to hide.
 */
export function faultDictionary(layout: Layout): Fault[] {
  return FAULT_KINDS.flatMap((kind) => faultsOfKind(kind, layout));
}
