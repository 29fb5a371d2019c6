import { isDeepStrictEqual } from 'node:util';
import { acceptSteps, wheelsIn } from '@/lib/mechanism/accept';
import type { Layout } from '@/lib/mechanism/layout';
import { readGlyphs } from '@/lib/mechanism/registers';
import type { Problem, Result } from '@/lib/mechanism/result';
import { REGISTERS, type Reading, type Step } from '@/lib/mechanism/steps';
import type { Logged, NewEntry, RunEntry } from '@/lib/schemas/run-shapes';
import { remarkInWords } from '@/lib/schemas/words';
import { admitted } from '../doors';
import { refuseInput } from '../http';
import { type RowToAdd, readingColumns } from './run-rows';

type Path = Problem['path'];

/** What the core's door let through, or 400: its problems stand where the body that was sent has them. */
function admittedAt<T>(result: Result<T>, place: (path: Path) => Path): T {
  if (result.ok) return admitted(result);
  const problems = result.problems.map((problem) => ({ ...problem, path: place(problem.path) }));
  return admitted({ ok: false, problems });
}

/** Steps as they were sent, canonical and at full width. In the body each stands one level deeper than at the door. */
export function acceptedEntries(layout: Layout, entries: readonly NewEntry[]): RowToAdd[] {
  const described = entries.map(({ step }) => step);
  const steps = admittedAt(acceptSteps(layout, described, ['entries']), ([list = 'entries', index, ...rest]) =>
    index === undefined ? [list] : [list, index, 'step', ...rest],
  );
  return entries.flatMap((entry, index) => {
    const step = steps[index];
    return step ? [{ ...entry, step }] : [];
  });
}

/** A reading alone, as its columns hold it. The door takes it with a step: any will do that every layout accepts. */
export function acceptedReading(layout: Layout, read: Reading): NonNullable<ReturnType<typeof readingColumns>> {
  const bearer = { do: 'reverse', on: false, read };
  const [step] = admittedAt(acceptSteps(layout, [bearer], []), ([, , ...rest]) => ['reading', ...rest]);
  const columns = readingColumns(step?.read);
  if (columns) return columns;
  return refuseInput([{ pointer: '/reading', detail: 'This machine has no counter; give the result.' }]);
}

/** What was filled in of a reading as it was sent: told, never done in silence. */
export function filledRemarks(layout: Layout, seq: number, read: Reading | undefined): Logged['remarks'] {
  return REGISTERS.flatMap((register) => {
    const text = read?.[register];
    const glyphs = text === undefined ? null : readGlyphs(text, wheelsIn(layout, register));
    if (text === undefined || !glyphs?.ok || glyphs.value.filled === 0) return [];
    const became = String(glyphs.value.filled);
    const { what } = remarkInWords({ line: null, column: register, code: 'zeros-filled', found: text, became });
    return [{ seq, register, what }];
  });
}

const operationOf = ({ read: _, ...operation }: Step): unknown => operation;

/** Whether what is sent under a known id is what was stored under it at first. */
export function isSame(sent: RowToAdd, stored: RunEntry): boolean {
  // A reading may have been put right since, or added where none was sent.
  const first = stored.corrections[0]?.was ?? stored.step.read;
  const read = readingColumns(sent.step.read);
  return (
    isDeepStrictEqual(operationOf(sent.step), operationOf(stored.step)) &&
    (read === null || isDeepStrictEqual(read, readingColumns(first))) &&
    (sent.note ?? '') === stored.note
  );
}
