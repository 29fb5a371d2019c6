import { rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, inject } from 'vitest';
import { freePort } from '@/cli/local/ports';
import { type RunningServer, startServer } from '@/cli/local/server';
import type { Role } from '@/lib/policy';
import { type TestDatabase, testDatabase } from './database';
import { TEST_PASSWORD, Visitor } from './visitor';

export { TEST_PASSWORD, Visitor } from './visitor';

export const TEST_SECRET = 'a secret of the tests, longer than it has to be';

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
  const note = path.join(inject('ground').servers, String(server.child.pid));
  writeFileSync(note, '');
  afterAll(async () => {
    await server.stop();
    rmSync(note, { force: true });
  });
  return { url: server.url, database, server, visitor: () => new Visitor(server.url) };
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
