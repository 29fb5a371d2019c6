export const WAYS = ['add', 'subtract'] as const;
export type Way = (typeof WAYS)[number];

export const REGISTERS = ['result', 'counter'] as const;
export type Register = (typeof REGISTERS)[number];

export const CLEARABLE = ['result', 'counter', 'both'] as const;
export type Clearable = (typeof CLEARABLE)[number];

export const OPERATIONS = ['set', 'turn', 'shift', 'reverse', 'clear'] as const;
export type OperationName = (typeof OPERATIONS)[number];

/** One thing done to the machine. Slides are written highest first, filled with zeros on the left. */
export type Operation =
  | { readonly do: 'set'; readonly slides: string }
  | { readonly do: 'turn'; readonly way: Way; readonly times?: number | undefined }
  | { readonly do: 'shift'; readonly to: number }
  | { readonly do: 'reverse'; readonly on: boolean }
  | { readonly do: 'clear'; readonly what: Clearable };

/** What the tester saw in the windows: glyphs highest wheel first (`0`–`9`, `4~`, `?`); either register may be unread. */
export interface Reading {
  readonly result?: string | undefined;
  readonly counter?: string | undefined;
}

/** An operation, with the reading taken after it if there was one. */
export type Step = Operation & { readonly read?: Reading | undefined };

/** Most turns in one step, and most steps in one call of the public interface. */
export const MOST_TIMES = 1_000_000;

/** Registers to start from; a missing one starts at zero. Digits only, highest wheel first. */
export interface Start {
  readonly result?: string | undefined;
  readonly counter?: string | undefined;
}
