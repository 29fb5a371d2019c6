import type { Step } from '../mechanism/steps';
import type { Moment } from './moment';

/** A step as a run's file carries it: what was done and read, when if known, and what the tester wrote beside it. */
export type RunStep = Step & {
  readonly at?: Moment | undefined;
  readonly note?: string | undefined;
};
