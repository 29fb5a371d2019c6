import type { AcceptedRun } from '@/lib/mechanism/accept';
import { needsSeed } from '@/lib/mechanism/accept-faults';
import { LIMITS } from '@/lib/schemas/limits';
import { refuseInput } from '../http';

/**
 * What a call costs. A healthy machine's turns are counted, however many, so that only its steps weigh. With faults,
 * turns may have to be made one by one, and with chance, every fault draws in every turn: those are bounded, and dear.
 */
export interface Work {
  readonly turns: number;
  /** Points for the rate limit, beyond the one that every call costs. */
  readonly points: number;
}

const written = (count: number): string => count.toLocaleString('en-GB');

const SPLIT = 'Split the run, and start the next call from the registers where this one ends.';

/** Measures the work of a call, and refuses with 400 one that is too much. */
export function workOf({ steps, faults }: Pick<AcceptedRun, 'steps' | 'faults'>): Work {
  const turns = steps.reduce((sum, step) => sum + (step.do === 'turn' ? (step.times ?? 1) : 0), 0);
  const points = Math.floor(steps.length / LIMITS.callPointSteps);
  if (faults.length === 0) return { turns, points };
  const chance = needsSeed(faults);
  const most = chance ? LIMITS.callChanceTurns : LIMITS.callTurns;
  const kind = chance ? 'faults that act only sometimes' : 'faults';
  if (turns > most)
    refuseInput([
      {
        pointer: '/steps',
        detail: `With ${kind}, one call makes at most ${written(most)} turns in all; these steps make ${written(turns)}. ${SPLIT}`,
      },
    ]);
  if (chance && turns * faults.length > LIMITS.callDraws)
    refuseInput([
      {
        pointer: '/faults',
        detail: `Turns times faults that act only sometimes may be at most ${written(LIMITS.callDraws)} in one call; here it is ${written(turns * faults.length)}. Take fewer faults, or split the run.`,
      },
    ]);
  const each = chance ? LIMITS.callPointChanceTurns : LIMITS.callPointTurns;
  return { turns, points: points + Math.floor(turns / each) };
}
