import { createDrive, driveHealthy } from '../mechanism/drive';
import type { Layout } from '../mechanism/layout';
import { createMachine } from '../mechanism/machine';
import { readGlyphs } from '../mechanism/registers';
import { type Operation, REGISTERS, type Register, type Start, type Step, type Way } from '../mechanism/steps';
import { judgeRegister } from './judge';
import type { LadderWheel } from './judgement';
import { addTurns, createTrack, restartCleared, restartRead, type Track } from './track';

export { type LadderWheel, VERDICTS, type Verdict, type WheelJudgement } from './judgement';

/** A reading judged. `step` is the index of its step; wheels run from wheel 1 (units) up. */
export interface JudgedReading {
  readonly step: number;
  readonly result: readonly LadderWheel[];
  readonly counter: readonly LadderWheel[];
}

export interface Place {
  readonly register: Register;
  readonly wheel: number;
}

export interface Comparison {
  readonly agrees: boolean;
  readonly readings: readonly JudgedReading[];
  readonly firstFault: { readonly step: number; readonly register: Register; readonly wheel: number } | null;
}

/** Where a machine stands between readings, for the bench's next step: what a healthy one would show now. */
export interface Standing {
  readonly result: string;
  readonly counter: string;
  readonly slides: string;
  readonly carriage: number;
  readonly reversed: boolean;
}

/** Judges a run step by step, in constant work a step, so that a ladder can grow row by row. */
export interface Comparer {
  /** Takes the next step; answers with the judged reading if the step carries one, else null. */
  take(step: Step): JudgedReading | null;
  readonly standing: Standing;
}

export interface ComparisonInput {
  readonly layout: Layout;
  readonly start?: Start | undefined;
  readonly steps: readonly Step[];
  readonly excluded?: readonly Place[] | undefined;
}

/** One register as it is followed from reading to reading. */
interface Followed {
  readonly track: Track;
  readonly excluded: ReadonlySet<number>;
}

function follow(digits: Readonly<Uint8Array>, register: Register, excluded: readonly Place[]): Followed {
  const wheels = excluded.filter((place) => place.register === register).map(({ wheel }) => wheel - 1);
  return { track: createTrack(digits), excluded: new Set(wheels) };
}

/** Glyphs of a reading that a door has let through already, wheel 1 first; null = not read. */
function acceptedGlyphs(text: string | undefined, wheels: number): readonly string[] | null {
  if (text === undefined) return null;
  const read = readGlyphs(text, wheels);
  if (!read.ok) throw new Error(`Not accepted before use: ${text}`);
  return read.value.glyphs;
}

/**
 * Judges a run step by step. What it is given must have passed the doors of `mechanism/accept`; a layout, start
 * or step that has not is a mistake of the caller and throws.
 */
export function createComparer(
  layout: Layout,
  options: { start?: Start | undefined; excluded?: readonly Place[] | undefined } = {},
): Comparer {
  const healthy = createMachine(layout, { start: options.start });
  const excluded = options.excluded ?? [];
  const result = follow(healthy.result, 'result', excluded);
  const counter = follow(healthy.counter, 'counter', excluded);
  const drive = createDrive(layout);
  let taken = 0;

  const turn = (way: Way, times: number): void => {
    const { carriage, reversed } = healthy;
    driveHealthy(drive, layout, healthy.slides, carriage, way);
    addTurns(result.track, drive.amounts, 0, drive.backward, drive.reach, times);
    const backward = (way === 'subtract') !== reversed;
    if (carriage > layout.counterWheels) return;
    addTurns(counter.track, [1], carriage - 1, backward, layout.counterCarry ? layout.counterWheels : -1, times);
  };

  const operate = (step: Step): void => {
    healthy.advance(step);
    if (step.do === 'turn') turn(step.way, step.times ?? 1);
    if (step.do !== 'clear') return;
    if (step.what !== 'counter') restartCleared(result.track);
    if (step.what !== 'result') restartCleared(counter.track);
  };

  const judge = (followed: Followed, text: string | undefined, expected: Readonly<Uint8Array>): LadderWheel[] => {
    const glyphs = acceptedGlyphs(text, expected.length);
    const wheels = judgeRegister(followed.track, glyphs, expected, followed.excluded);
    restartRead(followed.track, glyphs);
    return wheels;
  };

  return {
    take: (step) => {
      operate(step);
      taken += 1;
      if (!step.read) return null;
      return {
        step: taken - 1,
        result: judge(result, step.read.result, healthy.result),
        counter: judge(counter, step.read.counter, healthy.counter),
      };
    },
    get standing() {
      const { result: shown, counter: count, slides, carriage, reversed } = healthy.state;
      return { result: shown, counter: count, slides, carriage, reversed };
    },
  };
}

function isFaulty(wheel: LadderWheel): boolean {
  return wheel.verdict === 'differs' || wheel.verdict === 'between';
}

/** The lowest faulty wheel of a reading, the result before the counter, causes before what follows from them. */
export function firstFaultOf(reading: JudgedReading): Comparison['firstFault'] {
  const faulty = REGISTERS.flatMap((register) =>
    reading[register].filter(isFaulty).map(({ wheel, follows }) => ({ register, wheel, follows })),
  );
  const first = faulty.find(({ follows }) => !follows) ?? faulty[0];
  return first ? { step: reading.step, register: first.register, wheel: first.wheel } : null;
}

/** Judges a whole run of accepted steps. */
export function compare(input: ComparisonInput): Comparison {
  const comparer = createComparer(input.layout, input);
  const readings: JudgedReading[] = [];
  let firstFault: Comparison['firstFault'] = null;
  for (const step of input.steps) {
    const reading = comparer.take(step);
    if (!reading) continue;
    readings.push(reading);
    firstFault ??= firstFaultOf(reading);
  }
  return { agrees: firstFault === null, readings, firstFault };
}

/** The operation without its reading, for showing and logging. */
export function operationOf(step: Step): Operation {
  const { read: _, ...operation } = step;
  return operation;
}
