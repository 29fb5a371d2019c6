/** The states of a machine's life, in the order it passes through them. */
export const MACHINE_STATES = [
  'being-built',
  'running-in',
  'under-test',
  'accepted',
  'handed-over',
  'out-of-service',
] as const;
export type MachineState = (typeof MACHINE_STATES)[number];

export const MACHINE_STATE_WORDS: Record<MachineState, string> = {
  'being-built': 'being built',
  'running-in': 'running in',
  'under-test': 'under test',
  accepted: 'accepted',
  'handed-over': 'handed over',
  'out-of-service': 'out of service',
};

/** Most turns that a machine can have made before its log began: a turn a second for three centuries. */
export const MOST_TURNS_BEFORE = 10_000_000_000;
/** Most times its original's size that a build can be. */
export const MOST_SCALE = 100;
