import { z } from 'zod';

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

export const machineStateSchema = z.enum(MACHINE_STATES);
