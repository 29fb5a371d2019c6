import { AUTH_SECRET, DATABASE_URL, LOG_LEVEL, PUBLIC_ORIGIN } from 'astro:env/server';
import { defineMiddleware, sequence } from 'astro:middleware';
import type { APIContext, MiddlewareNext } from 'astro';
import { v7 } from 'uuid';
import { paths } from '@/lib/paths';
import { sessionIdOf } from '@/lib/server/auth/browser-session';
import { needsSecureCookies } from '@/lib/server/auth/config';
import { readFlash } from '@/lib/server/flash';
import { problem, Refusal } from '@/lib/server/http';
import { log } from '@/lib/server/log';
import { configure } from '@/lib/server/settings';
import { readSession } from '@/lib/server/store/sessions';
import { readTheme, THEME_COOKIE } from '@/lib/theme';

configure({ DATABASE_URL, AUTH_SECRET, PUBLIC_ORIGIN, LOG_LEVEL });

/** What a visitor may open; everything else needs a session. */
const OPEN_PAGES = [paths.home, '/sign-in', paths.signUp, paths.theme, paths.signOut, '/404', '/403', '/500'];
const OPEN_CALLS: string[] = [paths.api.health, paths.api.simulate, paths.api.compare, paths.api.openapi];

const isApi = (path: string): boolean => path.startsWith('/api/');

function isOpen(path: string): boolean {
  const plain = path.length > 1 ? path.replace(/\/$/, '') : path;
  return (
    OPEN_PAGES.includes(plain) ||
    OPEN_CALLS.includes(plain) ||
    plain.startsWith('/invitation/') ||
    plain.startsWith('/api/auth/') ||
    plain.startsWith('/_astro/')
  );
}

/** Calls that judge without an account never need to know who asks, and must answer with no database at hand. */
const needsNobody = (path: string): boolean => OPEN_CALLS.includes(path) || path.startsWith('/_astro/');

const identify = defineMiddleware(async (context, next) => {
  const { locals, url, cookies } = context;
  locals.requestId = v7();
  locals.theme = readTheme(cookies.get(THEME_COOKIE)?.value);
  locals.flash = null;
  locals.signedIn = null;
  if (needsNobody(url.pathname)) return next();
  const sid = await sessionIdOf(context);
  locals.signedIn = sid ? await readSession(sid) : null;
  return next();
});

const guard = defineMiddleware(({ locals, url, redirect }, next) => {
  if (locals.signedIn || isOpen(url.pathname)) return next();
  if (isApi(url.pathname)) return problem(401, {}, locals.requestId);
  return redirect(paths.signIn(url.pathname + url.search), 303);
});

/** What a page refuses becomes a page; only our own mistakes become a 500. */
async function answer(context: APIContext, next: MiddlewareNext): Promise<Response> {
  try {
    return await next();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    if (error.status === 401) return context.redirect(paths.signIn(context.url.pathname + context.url.search), 303);
    if (error.status === 404) return new Response(null, { status: 404 });
    context.locals.refusal = { status: error.status, text: error.message };
    // A request of its own: the body of the one that was refused may have been read already.
    return context.rewrite(new Request(new URL('/403', context.url), { headers: context.request.headers }));
  }
}

const refusals = defineMiddleware((context, next) => {
  context.locals.flash = isApi(context.url.pathname) ? null : readFlash(context.cookies);
  return answer(context, next);
});

const BASE_HEADERS = {
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'same-origin',
  'x-frame-options': 'DENY',
  'cross-origin-opener-policy': 'same-origin',
  'permissions-policy': 'camera=(self), microphone=(), geolocation=(), payment=()',
} as const;

/** The rest of the policy for what Astro cannot say in its own: who may frame us, where forms and bases may point. */
const POLICY = "frame-ancestors 'none'; object-src 'none'; base-uri 'none'; form-action 'self'";

const headers = defineMiddleware(async (context, next) => {
  const began = performance.now();
  const response = await next();
  const set = response.headers;
  for (const [name, value] of Object.entries(BASE_HEADERS)) set.set(name, value);
  set.append('content-security-policy', POLICY);
  if (needsSecureCookies(context.url)) set.set('strict-transport-security', 'max-age=31536000');
  if (!set.has('cache-control') && !context.url.pathname.startsWith('/_astro/')) set.set('cache-control', 'no-store');
  log().debug(
    {
      requestId: context.locals.requestId,
      method: context.request.method,
      path: context.url.pathname,
      status: response.status,
      ms: Math.round(performance.now() - began),
    },
    'request',
  );
  return response;
});

export const onRequest = sequence(headers, identify, guard, refusals);
