import { LIMITS } from '@/lib/schemas/limits';
import { Refusal, readBytes } from './http';
import type { GivenFile } from './store/run-imports';

/**
 * A name without a folder, and without the characters that no page, header or database should meet; never cut within a
 * character.
 */
export function plainName(text: string): string {
  const last = text.split(/[\\/]/u).at(-1) ?? '';
  return [...last.replaceAll(/[\p{Cc}\p{Cf}\p{Cs}]/gu, '').trim()].slice(0, 255).join('') || 'run.csv';
}

/** The file of a request: its body as it is, its name from the query. A name is shown and kept, never a path. */
export async function givenFile(request: Request, url: URL): Promise<GivenFile> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^(text\/csv|text\/plain|text\/tab-separated-values|application\/octet-stream)\b/i.test(type))
    throw new Refusal(415, { detail: 'Send the file itself, as text/csv or application/octet-stream.' });
  const bytes = await readBytes(request, LIMITS.importBytes);
  return { name: plainName(url.searchParams.get('name') ?? ''), bytes };
}
