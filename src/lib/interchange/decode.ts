import { CSV_LIMITS } from './limits';
import type { CsvProblem, CsvProblemCode } from './problems';

/** As the core's `Result`, with the problems of a file. */
export type CsvResult<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly problems: readonly CsvProblem[] };

/**
 * Bytes of an uploaded file to text. UTF-8 only, with or without a byte order mark (kept, so that the reader can say
 * it was there); anything else is refused, because a wrongly guessed encoding changes notes in silence.
 */
export function decodeCsv(bytes: Uint8Array): CsvResult<string> {
  if (bytes.length > CSV_LIMITS.bytes)
    return refuseFile('file-too-large', {
      expected: `${CSV_LIMITS.bytes} bytes`,
      found: `${bytes.length} bytes`,
    });
  if (looksLikeUtf16(bytes)) return refuseFile('utf-16', { expected: 'UTF-8', found: 'UTF-16' });
  try {
    return {
      ok: true,
      value: new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes),
    };
  } catch {
    return refuseFile('not-utf-8', {
      expected: 'UTF-8',
      found: 'bytes that are not UTF-8',
    });
  }
}

/** Its byte order mark, or every other byte of the beginning empty, as Latin letters are in UTF-16. */
function looksLikeUtf16(bytes: Uint8Array): boolean {
  const [first, second] = bytes;
  if ((first === 0xff && second === 0xfe) || (first === 0xfe && second === 0xff)) return true;
  const head = bytes.subarray(0, 64);
  if (head.length < 4) return false;
  const empty = (parity: number): boolean => head.every((byte, i) => i % 2 !== parity || byte === 0);
  return empty(0) !== empty(1);
}

function refuseFile(code: CsvProblemCode, more: { expected: string; found: string }): CsvResult<never> {
  return { ok: false, problems: [{ line: null, column: null, code, ...more }] };
}
