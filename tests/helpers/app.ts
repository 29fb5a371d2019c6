import { afterAll, inject } from 'vitest';
import { freePort } from '@/cli/local/ports';
import { type RunningServer, startServer } from '@/cli/local/server';
import type { Role } from '@/lib/policy';
import { type TestDatabase, testDatabase } from './database';

export const TEST_SECRET = 'a secret of the tests, longer than it has to be';
export const TEST_PASSWORD = 'seven slides and a crank';

export interface TestApp {
  readonly url: string;
  readonly database: TestDatabase;
  readonly server: RunningServer;
  /** A visitor with a cookie jar of their own. */
  visitor(): Visitor;
}

/** The built site on a free port with a database of its own; stopped when the test file ends. */
export async function startApp(environment: Record<string, string> = {}): Promise<TestApp> {
  const database = await testDatabase();
  const server = await startServer({
    build: inject('ground').build,
    host: '127.0.0.1',
    port: await freePort(),
    databaseUrl: database.url,
    authSecret: TEST_SECRET,
    environment: { LOG_LEVEL: 'warn', ...environment },
    output: 'collect',
  });
  afterAll(() => server.stop());
  return { url: server.url, database, server, visitor: () => new Visitor(server.url) };
}

/** A browser without a window: keeps cookies, sends its origin with forms, follows nothing by itself. */
export class Visitor {
  readonly cookies = new Map<string, string>();

  constructor(readonly base: string) {}

  async fetch(path: string, init: RequestInit = {}): Promise<Response> {
    const headers = new Headers(init.headers);
    if (this.cookies.size > 0)
      headers.set('cookie', [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; '));
    if (!headers.has('origin') && init.method && init.method !== 'GET') headers.set('origin', this.base);
    const response = await fetch(new URL(path, this.base), { redirect: 'manual', ...init, headers });
    for (const line of response.headers.getSetCookie()) this.#keep(line);
    return response;
  }

  #keep(line: string): void {
    const [pair = '', ...attributes] = line.split(';');
    const at = pair.indexOf('=');
    const name = pair.slice(0, at).trim();
    const gone = attributes.some((one) => /^\s*max-age=0\s*$/i.test(one) || /expires=thu, 01 jan 1970/i.test(one));
    if (gone) this.cookies.delete(name);
    else this.cookies.set(name, pair.slice(at + 1));
  }

  get(path: string): Promise<Response> {
    return this.fetch(path);
  }

  form(path: string, fields: Record<string, string>): Promise<Response> {
    return this.fetch(path, { method: 'POST', body: new URLSearchParams(fields) });
  }

  send(method: 'POST' | 'PATCH' | 'PUT' | 'DELETE', path: string, body?: unknown): Promise<Response> {
    return this.fetch(path, {
      method,
      headers: { 'content-type': 'application/json' },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
  }

  async signIn(email: string, password = TEST_PASSWORD): Promise<Response> {
    return this.form('/sign-in', { email, password });
  }
}

let people = 0;

export interface TestPerson {
  readonly visitor: Visitor;
  readonly email: string;
}

async function mustRedirect(response: Response, what: string): Promise<void> {
  if (response.status < 300 || response.status > 399)
    throw new Error(`${what}: ${response.status}\n${(await response.text()).slice(0, 2000)}`);
}

/** A new workshop with its lead, signed in. */
export async function newWorkshop(app: TestApp, name = 'Test yard'): Promise<TestPerson> {
  people += 1;
  const email = `lead${people}@example.org`;
  const visitor = app.visitor();
  const form = { workshop: name, name: `Lead ${people}`, email, password: TEST_PASSWORD, zone: 'Europe/Berlin' };
  await mustRedirect(await visitor.form('/sign-up', form), 'sign-up');
  return { visitor, email };
}

/** Somebody of a role, added by the lead and signed in through the one-time link. */
export async function newPerson(app: TestApp, lead: TestPerson, role: Role): Promise<TestPerson> {
  people += 1;
  const email = `${role}${people}@example.org`;
  const name = `${role} ${people}`;
  const made = await lead.visitor.send('POST', '/api/v1/invitations', { email, name, role });
  if (made.status !== 201) throw new Error(`invitation: ${made.status} ${await made.text()}`);
  const { link } = (await made.json()) as { link: string };
  const visitor = app.visitor();
  await mustRedirect(await visitor.form(new URL(link).pathname, { name, password: TEST_PASSWORD }), 'invitation');
  if (![...visitor.cookies.keys()].some((cookie) => cookie.includes('session')))
    await mustRedirect(await visitor.signIn(email), 'sign-in');
  return { visitor, email };
}
