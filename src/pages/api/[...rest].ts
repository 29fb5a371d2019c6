import type { APIRoute } from 'astro';
import { problem } from '@/lib/server/http';

/** Whatever no route answers: a program gets a problem document, not a page. */
export const ALL: APIRoute = ({ locals }) => problem(404, {}, locals.requestId);
