import type { Result } from '@/lib/mechanism/result';
import { detailOf } from '@/lib/schemas/words';
import { type BadInput, pointerTo, Refusal } from './http';

/** Most mistakes told in one answer; a body of ten thousand bad steps need not be repeated in full. */
const MOST_ERRORS = 100;

/** Refuses a body with 400 and what is wrong where. */
export function refuseInput(errors: readonly BadInput[]): never {
  const left = errors.length - MOST_ERRORS;
  const more = left > 0 ? ` The first ${MOST_ERRORS} of ${errors.length} are listed.` : '';
  throw new Refusal(400, {
    detail: `Some fields are not as expected.${more}`,
    errors: errors.slice(0, MOST_ERRORS),
  });
}

/** What a door of the core let through, or 400 in words. `under` is where the described part stands in the body. */
export function admitted<T>(result: Result<T>, under: readonly (string | number)[] = []): T {
  if (result.ok) return result.value;
  return refuseInput(
    result.problems.map((problem) => ({
      pointer: pointerTo([...under, ...problem.path]),
      detail: detailOf(problem),
    })),
  );
}
