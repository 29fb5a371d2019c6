import { type Answer, call } from '@/lib/client/call';
import type { Reading } from '@/lib/mechanism/steps';
import { paths } from '@/lib/paths';
import type { Append, Logged, RunShown } from '@/lib/schemas/run-shapes';

/** The calls that a run's page makes. */
export interface RunCalls {
  readonly load: () => Promise<Answer<RunShown>>;
  readonly append: (body: Append) => Promise<Answer<Logged>>;
  readonly takeBack: (seq: number, reason: string) => Promise<Answer<Logged>>;
  readonly correct: (body: {
    seq: number;
    reading: Reading;
    reason?: string;
    replaces: string | null;
  }) => Promise<Answer<Logged>>;
  readonly finish: () => Promise<Answer<unknown>>;
  readonly remove: () => Promise<Answer<unknown>>;
}

export function runCalls(id: string): RunCalls {
  return {
    load: () => call('GET', paths.api.run(id)),
    append: (body) => call('POST', paths.api.runSteps(id), body),
    takeBack: (seq, reason) => call('DELETE', paths.api.runStep(id, seq), { reason }),
    correct: (body) => call('POST', paths.api.runCorrections(id), body),
    finish: () => call('POST', paths.api.runFinish(id), {}),
    remove: () => call('DELETE', paths.api.run(id)),
  };
}
