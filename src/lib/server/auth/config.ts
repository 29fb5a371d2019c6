import Credentials from '@auth/core/providers/credentials';
import { defineConfig } from 'auth-astro';
import { settings } from '../settings';
import { LONGEST_DAYS } from '../store/sessions';

declare module '@auth/core/types' {
  interface Session {
    /** Id of the session row behind the token. */
    sid?: string;
  }
}

/** Loopback is the one place where a cookie may travel without TLS. */
export function needsSecureCookies(url: URL): boolean {
  const origin = settings().publicOrigin;
  const { protocol, hostname } = origin ? new URL(origin) : url;
  return protocol === 'https:' || !['localhost', '127.0.0.1', '[::1]'].includes(hostname);
}

/**
 * Auth.js as this site uses it: the token carries the id of a session row and nothing else. `sid` is the row that a
 * sign-in has just made; without it nobody can sign in, so the integration's own routes let nobody in.
 */
export function authConfig(sid: string | null) {
  return defineConfig({
    prefix: '/api/auth',
    trustHost: true,
    get secret() {
      return settings().authSecret;
    },
    session: { strategy: 'jwt', maxAge: LONGEST_DAYS * 24 * 60 * 60 },
    pages: { signIn: '/sign-in', error: '/sign-in' },
    providers: [Credentials({ credentials: {}, authorize: () => (sid === null ? null : { id: sid }) })],
    callbacks: {
      jwt: ({ token, user }) => (user?.id ? { sid: user.id } : token),
      session: ({ session, token }) => ({ expires: session.expires, sid: String(token.sid ?? '') }),
    },
    logger: { error: () => {}, warn: () => {}, debug: () => {} },
  });
}

export default authConfig(null);
