import type { APIContext, APIRoute } from 'astro';
import type { z } from 'zod';
import { LIMITS } from '@/lib/schemas/limits';
import { log } from './log';

/** One place in a request body and what is wrong there (RFC 9457 extension, JSON Pointer of RFC 6901). */
export interface BadInput {
  readonly pointer: string;
  readonly detail: string;
}

interface RefusalDetails {
  readonly detail?: string | undefined;
  readonly errors?: readonly BadInput[] | undefined;
  readonly headers?: Record<string, string> | undefined;
}

const TITLES: Record<number, string> = {
  400: 'The request cannot be understood',
  401: 'Sign in first',
  403: 'Your role does not allow this',
  404: 'There is nothing here',
  409: 'This has changed meanwhile',
  413: 'The request is too large',
  415: 'The request has the wrong type',
  429: 'Too many requests',
  500: 'Something went wrong on our side',
  503: 'Not available at the moment',
};

/** Ends a request with a problem document. Guards and stores throw it; `endpoint` answers with it. */
export class Refusal extends Error {
  constructor(
    readonly status: number,
    readonly details: RefusalDetails = {},
  ) {
    super(details.detail ?? TITLES[status] ?? `Status ${status}`);
  }
}

export const notFound = (detail?: string): Refusal => new Refusal(404, { detail });

/** A problem document of RFC 9457. */
export function problem(status: number, details: RefusalDetails = {}, instance?: string): Response {
  const body = {
    type: 'about:blank',
    title: TITLES[status] ?? `Status ${status}`,
    status,
    ...(details.detail ? { detail: details.detail } : {}),
    ...(instance ? { instance: `urn:uuid:${instance}` } : {}),
    ...(details.errors ? { errors: details.errors } : {}),
  };
  return new Response(JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store', ...details.headers },
  });
}

export function json(value: unknown, status = 200, headers: Record<string, string> = {}): Response {
  return new Response(JSON.stringify(value), {
    status,
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store', ...headers },
  });
}

/** Wraps a route: what it throws becomes a problem document, and only our own mistakes become a 500. */
export function endpoint(handle: (context: APIContext) => Promise<Response> | Response): APIRoute {
  return async (context) => {
    try {
      return await handle(context);
    } catch (error) {
      if (error instanceof Refusal) return problem(error.status, error.details, context.locals.requestId);
      log().error({ err: error, requestId: context.locals.requestId, path: context.url.pathname }, 'request failed');
      return problem(
        500,
        { detail: 'Nothing was changed. Try again; if it stays, report the instance below.' },
        context.locals.requestId,
      );
    }
  };
}

/** Reads at most `limit` bytes of a body; a longer one is refused without reading on. */
export async function readBytes(request: Request, limit: number): Promise<Uint8Array> {
  const tooLarge = (): Refusal => new Refusal(413, { detail: `At most ${limit} bytes are taken in one request.` });
  if (Number(request.headers.get('content-length') ?? 0) > limit) throw tooLarge();
  const parts: Uint8Array[] = [];
  let size = 0;
  const reader = request.body?.getReader();
  for (let part = await reader?.read(); part && !part.done; part = await reader?.read()) {
    size += part.value.byteLength;
    if (size > limit) throw tooLarge();
    parts.push(part.value);
  }
  return Buffer.concat(parts);
}

/** JSON body through a schema: 415, 413 or 400 with a pointer to each mistake. */
export async function readJson<T extends z.ZodType>(
  request: Request,
  schema: T,
  limit: number = LIMITS.callBytes,
): Promise<z.output<T>> {
  if (!/^application\/([\w.-]+\+)?json\b/i.test(request.headers.get('content-type') ?? ''))
    throw new Refusal(415, { detail: 'Send application/json.' });
  const bytes = await readBytes(request, limit);
  let value: unknown;
  try {
    value = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch {
    throw new Refusal(400, {
      detail: 'The body is not JSON in UTF-8.',
      errors: [{ pointer: '', detail: 'Not JSON.' }],
    });
  }
  const parsed = schema.safeParse(value);
  if (!parsed.success) refuseInput(parsed.error.issues.flatMap(badInputs));
  return parsed.data;
}

/** Most mistakes told in one answer; a body of ten thousand bad steps need not be repeated in full. */
const MOST_ERRORS = 100;

/** Refuses a body with 400 and what is wrong where. */
export function refuseInput(errors: readonly BadInput[]): never {
  const more = errors.length > MOST_ERRORS ? ` The first ${MOST_ERRORS} of ${errors.length} are listed.` : '';
  throw new Refusal(400, {
    detail: `Some fields are not as expected.${more}`,
    errors: errors.slice(0, MOST_ERRORS),
  });
}

/** What a schema found wrong, as pointers and words; each unknown field has a pointer of its own. */
export function badInputs(issue: z.core.$ZodIssue): BadInput[] {
  if (issue.code !== 'unrecognized_keys') return [{ pointer: pointerTo(issue.path), detail: issue.message }];
  return issue.keys.map((key) => ({
    pointer: pointerTo([...issue.path, key]),
    detail: 'This field is not known here; take it out or check its spelling.',
  }));
}

/** JSON Pointer (RFC 6901) of a path. */
export function pointerTo(path: readonly PropertyKey[]): string {
  return path.map((part) => `/${String(part).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');
}
