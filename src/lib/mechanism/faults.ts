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
    | { readonly kind: 'slide-off'; readonly slide: number; readonly by: 1 | -1 }
    | { readonly kind: 'slide-stuck'; readonly slide: number; readonly at: number }
    | { readonly kind: 'tooth-short'; readonly tooth: number; readonly drum: 'add' | 'subtract' }
    | { readonly kind: 'clear-missed'; readonly register: Register; readonly wheel: number }
    | { readonly kind: 'counter-missed' | 'counter-carry-missed'; readonly wheel: number }
    | { readonly kind: 'reverse-dead' | 'counter-inverted' }
    | { readonly kind: 'carriage-off'; readonly position: number; readonly by: 1 | -1 }
  );

/** Every single fault that a layout can have, at every place, with rate 1: 207 for the usual layout. */
export declare function faultDictionary(layout: Layout): Fault[];
