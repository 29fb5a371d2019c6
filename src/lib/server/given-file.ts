import { LIMITS } from '@/lib/schemas/limits';
import { Refusal, readBytes } from './http';
import type { GivenFile } from './store/run-imports';

/** The file of a request: its body as it is, its name from the query. A name is shown and kept, never a path. */
export async function givenFile(request: Request, url: URL): Promise<GivenFile> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^(text\/csv|text\/plain|text\/tab-separated-values|application\/octet-stream)\b/i.test(type))
    throw new Refusal(415, { detail: 'Send the file itself, as text/csv or application/octet-stream.' });
  const bytes = await readBytes(request, LIMITS.importBytes);
  const name = (url.searchParams.get('name') ?? '').split(/[\\/]/).at(-1)?.trim().slice(0, 255) || 'run.csv';
  return { name, bytes };
}
