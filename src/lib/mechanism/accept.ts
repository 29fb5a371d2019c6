import { acceptFaults, needsSeed } from './accept-faults';
import { field, type Path, type Plain, plain, wholeNumber } from './description';
import type { Fault } from './faults';
import type { Layout } from './layout';
import { readDigits, readGlyphs, under, writeDigits, writeGlyphs } from './registers';
import { accept, type Problem, type Result } from './result';
import {
  CLEARABLE,
  MOST_TIMES,
  OPERATIONS,
  type Operation,
  REGISTERS,
  type Reading,
  type Register,
  type Start,
  type Step,
  WAYS,
} from './steps';

/** Most steps in one run. */
export const MOST_STEPS = 10_000;

/** A register of a run, whose places are set by the layout. */
export function wheelsIn(layout: Layout, register: Register): number {
  return register === 'result' ? layout.resultWheels : layout.counterWheels;
}

function ended<T>(problems: readonly Problem[], value: T): Result<T> {
  return problems.length > 0 ? { ok: false, problems: [...problems] } : accept(value);
}

function setOperation(layout: Layout, step: Plain, path: Path, problems: Problem[]): Operation {
  const slides = field.text(step, 'slides', path, problems);
  if (slides === null) return { do: 'set', slides: '' };
  const read = readDigits(slides, layout.settingSlides, 'digit-beyond-slides');
  if (read.ok) return { do: 'set', slides: writeDigits(read.value) };
  problems.push(...under([...path, 'slides'], read.problems));
  return { do: 'set', slides: '' };
}

function turnOperation(layout: Layout, step: Plain, path: Path, problems: Problem[]): Operation {
  const way = field.oneOf(step, 'way', WAYS, path, problems) ?? 'add';
  if (way === 'subtract' && layout.subtraction === 'none')
    problems.push({
      code: 'not-in-layout',
      path: [...path, 'way'],
      expected: 'add',
      found: way,
    });
  if (step.times === undefined) return { do: 'turn', way };
  const times = field.count(step, 'times', 1, MOST_TIMES, 'out-of-range', path, problems) ?? 1;
  return { do: 'turn', way, times };
}

function operationAt(layout: Layout, step: Plain, path: Path, problems: Problem[]): Operation | null {
  switch (field.oneOf(step, 'do', OPERATIONS, path, problems)) {
    case 'set':
      return setOperation(layout, step, path, problems);
    case 'turn':
      return turnOperation(layout, step, path, problems);
    case 'shift': {
      const to = field.count(step, 'to', 1, layout.carriagePositions, 'out-of-range', path, problems) ?? 1;
      return { do: 'shift', to };
    }
    case 'reverse':
      return {
        do: 'reverse',
        on: field.truth(step, 'on', path, problems) ?? false,
      };
    case 'clear':
      return {
        do: 'clear',
        what: field.oneOf(step, 'what', CLEARABLE, path, problems) ?? 'both',
      };
    case null:
      return null;
  }
}

function readingAt(layout: Layout, found: unknown, path: Path, problems: Problem[]): Reading {
  const reading = plain(found, path, problems);
  const accepted: { -readonly [key in Register]?: string } = {};
  for (const register of reading ? REGISTERS : []) {
    if (reading?.[register] === undefined) continue;
    const text = field.text(reading, register, path, problems);
    if (text === null) continue;
    const read = readGlyphs(text, wheelsIn(layout, register));
    if (read.ok) accepted[register] = writeGlyphs(read.value.glyphs);
    else problems.push(...under([...path, register], read.problems));
  }
  return accepted;
}

/**
 * The door for steps: every one checked against the layout and written canonically (slides and readings with all
 * their places). Problems point at their field, such as `['steps', 3, 'slides']`. Clearing or reversing a counter
 * that a layout does not have is allowed: it does nothing, as on the machine.
 */
export function acceptSteps(layout: Layout, steps: unknown, at: Path = ['steps']): Result<Step[]> {
  if (!Array.isArray(steps)) return ended([{ code: 'missing', path: at, expected: 'a list' }], []);
  const problems: Problem[] = [];
  if (steps.length > MOST_STEPS)
    return ended(
      [
        {
          code: 'too-many',
          path: at,
          expected: `${MOST_STEPS}`,
          found: `${steps.length}`,
        },
      ],
      [],
    );
  const accepted: Step[] = [];
  steps.forEach((found: unknown, index) => {
    const path = [...at, index];
    const step = plain(found, path, problems);
    const operation = step && operationAt(layout, step, path, problems);
    if (!step || !operation) return;
    const read = step.read;
    accepted.push(
      read === undefined
        ? operation
        : {
            ...operation,
            read: readingAt(layout, read, [...path, 'read'], problems),
          },
    );
  });
  return ended(problems, accepted);
}

/** The door for the registers to start from. A register left out starts at zero. */
export function acceptStart(layout: Layout, start: unknown, at: Path = ['start']): Result<Start> {
  if (start === undefined) return accept({});
  const problems: Problem[] = [];
  const described = plain(start, at, problems);
  const accepted: { -readonly [key in Register]?: string } = {};
  for (const register of described ? REGISTERS : []) {
    if (described?.[register] === undefined) continue;
    const text = field.text(described, register, at, problems);
    if (text === null) continue;
    const read = readDigits(text, wheelsIn(layout, register));
    if (read.ok) accepted[register] = writeDigits(read.value);
    else problems.push(...under([...at, register], read.problems));
  }
  return ended(problems, accepted);
}

/** A wheel left out of the judgement. */
export interface ExcludedWheel {
  readonly register: Register;
  readonly wheel: number;
}

/** The door for excluded wheels. */
export function acceptExcluded(layout: Layout, excluded: unknown, at: Path = ['excluded']): Result<ExcludedWheel[]> {
  if (excluded === undefined) return accept([]);
  if (!Array.isArray(excluded)) return ended([{ code: 'missing', path: at, expected: 'a list' }], []);
  if (excluded.length > 64)
    return ended(
      [
        {
          code: 'too-many',
          path: at,
          expected: '64',
          found: `${excluded.length}`,
        },
      ],
      [],
    );
  const problems: Problem[] = [];
  const accepted: ExcludedWheel[] = [];
  excluded.forEach((found: unknown, index) => {
    const path = [...at, index];
    const place = plain(found, path, problems);
    const register = place && field.oneOf(place, 'register', REGISTERS, path, problems);
    if (!place || !register) return;
    const most = wheelsIn(layout, register);
    const wheel = field.count(place, 'wheel', 1, most, 'not-in-layout', path, problems);
    if (wheel !== null) accepted.push({ register, wheel });
  });
  return ended(problems, accepted);
}

/** A run as somebody describes it, every field unknown. */
export interface RunDescription {
  readonly start?: unknown;
  readonly faults?: unknown;
  readonly steps?: unknown;
  readonly excluded?: unknown;
  readonly seed?: unknown;
}

/** A run that has passed every door, and all problems of all doors at once where it has not. */
export interface AcceptedRun {
  readonly layout: Layout;
  readonly start: Start;
  readonly faults: readonly Fault[];
  readonly steps: readonly Step[];
  readonly excluded: readonly ExcludedWheel[];
  readonly seed?: number | undefined;
}

/** The seed, which a run needs when any of its faults acts only sometimes. */
export function acceptSeed(seed: unknown, faults: readonly Fault[], at: Path = ['seed']): Result<number | undefined> {
  if (seed === undefined)
    return needsSeed(faults) ? ended([{ code: 'seed-needed', path: at }], undefined) : accept(undefined);
  const problems: Problem[] = [];
  return ended(problems, wholeNumber(seed, at, problems) ?? undefined).ok
    ? accept(seed as number)
    : { ok: false, problems };
}

/**
 * Most turns in a run whose faults act only sometimes. Such turns must be made one by one, where all others are
 * counted: this many take a few seconds.
 */
export const MOST_TURNS_OF_CHANCE = 5_000_000;

/** Refuses a run by chance that would keep a server busy for minutes. */
function acceptTurns(steps: readonly Step[], faults: readonly Fault[]): Result<null> {
  if (!needsSeed(faults)) return accept(null);
  const turns = steps.reduce((sum, step) => sum + (step.do === 'turn' ? (step.times ?? 1) : 0), 0);
  const problem = {
    code: 'too-many',
    path: ['steps'],
    expected: `${MOST_TURNS_OF_CHANCE}`,
    found: `${turns}`,
  } as const;
  return ended(turns > MOST_TURNS_OF_CHANCE ? [problem] : [], null);
}

/** All the doors in one: what simulation and comparison run on. */
export function acceptRun(layout: Layout, run: RunDescription): Result<AcceptedRun> {
  const start = acceptStart(layout, run.start);
  const faults = acceptFaults(layout, run.faults ?? []);
  const steps = acceptSteps(layout, run.steps);
  const excluded = acceptExcluded(layout, run.excluded);
  const seed = acceptSeed(run.seed, faults.ok ? faults.value : []);
  const turns = acceptTurns(steps.ok ? steps.value : [], faults.ok ? faults.value : []);
  if (start.ok && faults.ok && steps.ok && excluded.ok && seed.ok && turns.ok)
    return accept({
      layout,
      start: start.value,
      faults: faults.value,
      steps: steps.value,
      excluded: excluded.value,
      seed: seed.value,
    });
  return {
    ok: false,
    problems: [start, faults, steps, excluded, seed, turns].flatMap((door) => (door.ok ? [] : door.problems)),
  };
}
