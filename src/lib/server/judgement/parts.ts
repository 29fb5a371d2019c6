import { setImmediate } from 'node:timers/promises';
import { createComparer, firstFaultOf, type JudgedReading, type WheelJudgement } from '@/lib/comparison/compare';
import type { AcceptedRun } from '@/lib/mechanism/accept';
import { createMachine, type Machine, type MachineState } from '@/lib/mechanism/machine';
import type { Operation } from '@/lib/mechanism/steps';

/**
 * Answers to the public calls, written piece by piece: an answer may be ninety times the size of its question, and
 * the server lets others work between two pieces. A client that has gone stops the work.
 */
type Parts = AsyncGenerator<string, void, undefined>;

/** Characters of a piece, and turns made at once: each about as long as a few ordinary requests. */
const PIECE = 64 * 1024;
const TURNS_AT_ONCE = 10_000;

/** Does an operation as one would in a single go, with pauses: equal turns may be made in portions. */
async function applyInPortions(machine: Machine, operation: Operation): Promise<MachineState> {
  if (operation.do !== 'turn') return machine.apply(operation);
  let left = operation.times ?? 1;
  let overflow = false;
  for (; left > TURNS_AT_ONCE; left -= TURNS_AT_ONCE) {
    overflow = machine.apply({ ...operation, times: TURNS_AT_ONCE }).overflow || overflow;
    await setImmediate();
  }
  const state = machine.apply({ ...operation, times: left });
  return { ...state, overflow: state.overflow || overflow };
}

/** The answer of `simulate`: one state a step. */
export async function* simulatedParts(run: AcceptedRun): Parts {
  const machine = createMachine(run.layout, run);
  let piece = '{"states":[';
  let turned = 0;
  for (const [index, step] of run.steps.entries()) {
    const state = await applyInPortions(machine, step);
    piece += `${index > 0 ? ',' : ''}${JSON.stringify(state)}`;
    turned += step.do === 'turn' ? (step.times ?? 1) : 0;
    if (piece.length < PIECE && turned < TURNS_AT_ONCE) continue;
    yield piece;
    piece = '';
    turned = 0;
    await setImmediate();
  }
  yield `${piece}]}`;
}

/** A judged wheel as the public answer has it: without what only the ladder needs. */
function shownWheel(wheel: WheelJudgement): WheelJudgement {
  return {
    wheel: wheel.wheel,
    read: wheel.read,
    expected: wheel.expected,
    expectedFromLast: wheel.expectedFromLast,
    verdict: wheel.verdict,
    stepsOff: wheel.stepsOff,
    carryDue: wheel.carryDue,
    carryMade: wheel.carryMade,
  };
}

function writeReading({ step, result, counter }: JudgedReading): string {
  return JSON.stringify({ step, result: result.map(shownWheel), counter: counter.map(shownWheel) });
}

/** The answer of `compare`. What sums it up stands at the end, when every reading has been judged. */
export async function* comparedParts(run: AcceptedRun): Parts {
  const comparer = createComparer(run.layout, run);
  let firstFault: ReturnType<typeof firstFaultOf> = null;
  let readings = 0;
  let piece = '{"readings":[';
  for (const step of run.steps) {
    const reading = comparer.take(step);
    if (!reading) continue;
    firstFault ??= firstFaultOf(reading);
    piece += `${readings > 0 ? ',' : ''}${writeReading(reading)}`;
    readings += 1;
    if (piece.length < PIECE) continue;
    yield piece;
    piece = '';
    await setImmediate();
  }
  yield `${piece}],"agrees":${firstFault === null},"firstFault":${JSON.stringify(firstFault)}}`;
}

/** A JSON answer made of pieces. The first is made before the answer begins, so that a mistake there is still told. */
export async function streamedJson(parts: Parts): Promise<Response> {
  const encoder = new TextEncoder();
  const first = await parts.next();
  let next: string | null = first.done ? null : first.value;
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      if (next === null) return controller.close();
      controller.enqueue(encoder.encode(next));
      const made = await parts.next();
      next = made.done ? null : made.value;
      if (next === null) controller.close();
    },
    async cancel() {
      await parts.return();
    },
  });
  return new Response(body, { headers: { 'content-type': 'application/json', 'cache-control': 'no-store' } });
}
