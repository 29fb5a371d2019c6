import { acceptSteps, wheelsIn } from '@/lib/mechanism/accept';
import type { Layout } from '@/lib/mechanism/layout';
import { readGlyphs } from '@/lib/mechanism/registers';
import type { Operation, Reading, Register, Step } from '@/lib/mechanism/steps';
import { detailOf } from '@/lib/schemas/words';

/** What was typed, taken apart: texts as typed, not judged yet. `open` = there is a separator, so both are meant. */
export interface Typed {
  readonly result: string;
  readonly counter: string;
  readonly open: boolean;
}

/** Or a sentence that says why it cannot be taken apart. */
export type TypedOrTrouble = Typed | string;

/**
 * Takes apart one line of typing: `7 1`, `7/1`, `7`, `/1`. A slash always separates result and counter; without one
 * a single space does. Nothing is guessed: more groups than two need the slash.
 */
export function takeApart(text: string, layout: Layout): TypedOrTrouble {
  if (layout.counterWheels === 0)
    return text.includes('/')
      ? 'This machine has no counter: type the result only.'
      : { result: text.trim(), counter: '', open: false };
  const [result = '', counter, ...more] = text.split('/');
  if (more.length > 0) return 'One / stands between result and counter; there are more here.';
  if (counter !== undefined) return { result: result.trim(), counter: counter.trim(), open: true };
  const groups = text.trim().split(/\s+/u);
  if (groups.length > 2) return 'These are more than two groups. Put a / between result and counter.';
  const spaced = /\S\s/u.test(text);
  return { result: groups[0] ?? '', counter: groups[1] ?? '', open: spaced };
}

/** One window of a register as it is typed so far. `typed` is false for a zero that is filled in on the left. */
export interface WindowShown {
  readonly wheel: number;
  readonly glyph: string;
  readonly typed: boolean;
}

/**
 * How the windows of a register will be taken, highest first: typed glyphs at the right, ghost zeros before them.
 * Null where the text is no reading (yet): then nothing is shown as understood.
 */
export function windowsOf(text: string, wheels: number): readonly WindowShown[] | null {
  const empty = text === '';
  const read = empty ? null : readGlyphs(text, wheels);
  if (read && !read.ok) return null;
  const typed = read ? wheels - read.value.filled : 0;
  return Array.from({ length: wheels }, (_, index) => {
    const wheel = wheels - index;
    return {
      wheel,
      glyph: read ? (read.value.glyphs[wheel - 1] ?? '0') : '',
      typed: wheel <= typed,
    };
  });
}

/** The reading typed, registers left empty left out. */
export function readingOf({ result, counter }: Typed): Reading | undefined {
  if (result === '' && counter === '') return undefined;
  return {
    ...(result !== '' && { result }),
    ...(counter !== '' && { counter }),
  };
}

const NAMES: Record<Register, string> = {
  result: 'Result',
  counter: 'Counter',
};

/** A step through the core's door: canonical, or what is wrong in words. */
export function acceptStep(layout: Layout, operation: Operation, read?: Reading): Step | string {
  const steps = acceptSteps(layout, [{ ...operation, ...(read && { read }) }]);
  if (steps.ok) return steps.value[0] ?? 'Nothing was understood.';
  const [problem] = steps.problems;
  if (!problem) return 'Nothing was understood.';
  const register = problem.path.at(-1);
  const name = register === 'result' || register === 'counter' ? `${NAMES[register]}: ` : '';
  return name + detailOf(problem);
}

/** The wheels of a register, for the windows. */
export const wheelsOf = wheelsIn;
