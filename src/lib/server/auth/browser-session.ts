import { Auth, type AuthConfig, skipCSRFCheck } from '@auth/core';
import type { APIContext } from 'astro';
import { scoped } from '../db/scope';
import { closeSession, openSession } from '../store/sessions';
import { authConfig, needsSecureCookies } from './config';

type Context = Pick<APIContext, 'request' | 'url' | 'clientAddress'>;

function options(context: Context, sid: string | null): AuthConfig {
  // Our pages call Auth.js from the server; Astro has checked the form's origin before.
  return {
    ...authConfig(sid),
    basePath: '/api/auth',
    useSecureCookies: needsSecureCookies(context.url),
    skipCSRFCheck,
  };
}

function innerRequest(context: Context, action: string, form?: Record<string, string>): Request {
  const headers = new Headers({ cookie: context.request.headers.get('cookie') ?? '' });
  const url = new URL(`/api/auth/${action}`, context.url);
  return new Request(url, form ? { method: 'POST', headers, body: new URLSearchParams(form) } : { headers });
}

/** The session row named by the request's token; null where there is no token, or none that we signed. */
export async function sessionIdOf(context: Context): Promise<string | null> {
  if (!context.request.headers.get('cookie')?.includes('authjs.session-token')) return null;
  const response = await Auth(innerRequest(context, 'session'), options(context, null));
  const session = (await response.json()) as { sid?: string } | null;
  return session?.sid || null;
}

/** Makes a session row for a person whose password has just been right, and the cookies that carry its id. */
export async function signInAs(context: Context, personId: string, workshopId: string): Promise<string[]> {
  const sid = await scoped({ person: personId }, (tx) =>
    openSession(tx, {
      personId,
      workshopId,
      address: context.clientAddress,
      agent: context.request.headers.get('user-agent')?.slice(0, 200) ?? null,
    }),
  );
  const response = await Auth(innerRequest(context, 'callback/credentials', { sid }), options(context, sid));
  const cookies = response.headers.getSetCookie();
  if (!cookies.some((line) => line.includes('authjs.session-token')))
    throw new Error('Auth.js gave no session token for a good sign-in.');
  return cookies;
}

/** Takes the row away, so that a copied token is worth nothing, and the cookies that carried it. */
export async function signOut(context: Context): Promise<string[]> {
  const sid = await sessionIdOf(context);
  if (sid) await scoped({ session: sid }, (tx) => closeSession(tx, sid));
  const response = await Auth(innerRequest(context, 'signout', {}), options(context, null));
  return response.headers.getSetCookie();
}

/** A redirect after a form, with the cookies to set. */
export function redirectWith(location: string, cookies: readonly string[]): Response {
  const headers = new Headers({ location, 'cache-control': 'no-store' });
  for (const cookie of cookies) headers.append('set-cookie', cookie);
  return new Response(null, { status: 303, headers });
}
