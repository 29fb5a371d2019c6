import { z } from 'zod';
import type { ZodOpenApiPathsObject, ZodOpenApiResponseObject } from 'zod-openapi';

/** Paths of one feature, to be listed in `openapi.ts`. */
export type ApiPaths = ZodOpenApiPathsObject;

/** A problem document of RFC 9457, as every refusal has it. */
export const problemSchema = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    detail: z.string().optional().meta({ description: 'What is wrong here, and the cure.' }),
    instance: z.string().optional().meta({ description: 'Names the request in the log of the server.' }),
    errors: z
      .array(
        z.object({
          pointer: z.string().meta({ description: 'JSON Pointer (RFC 6901) into the body.' }),
          detail: z.string(),
        }),
      )
      .optional()
      .meta({ description: 'What is wrong where; at most the first hundred.' }),
  })
  .meta({ id: 'Problem', description: 'A problem document (RFC 9457).' });

const MEANINGS = {
  400: 'The body is not as expected; `errors` says what is wrong where.',
  401: 'Nobody is signed in.',
  403: 'The role does not allow this.',
  404: 'The workshop has nothing with this id.',
  409: 'Somebody has changed this meanwhile, or it is taken; `detail` says which.',
  413: 'The body is too large.',
  415: 'The body is not application/json.',
  429: 'Too many calls from this address; `Retry-After` says in how many seconds to try again.',
  503: 'Not available at the moment.',
} as const;
type RefusalStatus = keyof typeof MEANINGS;

/** The refusals that an operation can answer with. */
export function refusals(...statuses: readonly RefusalStatus[]): Record<string, ZodOpenApiResponseObject> {
  return Object.fromEntries(
    statuses.map((status) => [
      String(status),
      {
        description: MEANINGS[status],
        content: { 'application/problem+json': { schema: problemSchema } },
        ...(status === 429
          ? { headers: { 'Retry-After': { description: 'Seconds to wait.', schema: { type: 'integer' } } } }
          : {}),
      } satisfies ZodOpenApiResponseObject,
    ]),
  );
}

/** A JSON answer, or a body when used as one. */
export function jsonOf(schema: z.ZodType, description: string): ZodOpenApiResponseObject {
  return { description, content: { 'application/json': { schema } } };
}

/** A JSON body, required. */
export function bodyOf(schema: z.ZodType): { required: true; content: { 'application/json': { schema: z.ZodType } } } {
  return { required: true, content: { 'application/json': { schema } } };
}

/** Refusals of what needs a member of a workshop and may be asked of a row that is not theirs. */
export const MEMBER_REFUSALS = [401, 403, 404] as const;
export const BODY_REFUSALS = [400, 413, 415] as const;
