import type { Result } from '@/lib/mechanism/result';
import { detailOf } from '@/lib/schemas/words';
import { pointerTo, refuseInput } from './http';

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
