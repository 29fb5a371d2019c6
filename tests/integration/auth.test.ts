import { newPerson, newWorkshop, startApp, TEST_PASSWORD, type TestApp, type TestPerson } from '@tests/helpers/app';
import { connectTo } from '@tests/helpers/database';
import { sql } from 'drizzle-orm';
import { beforeAll, describe, expect, it } from 'vitest';
import { schema } from '@/lib/server/db/client';

let app: TestApp;
let lead: TestPerson;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Reed bench');
});

const sessionCookie = (response: Response): string =>
  response.headers.getSetCookie().find((line) => line.includes('session-token')) ?? '';

describe('signing in', () => {
  it('opens the pages, sets a cookie that scripts cannot read, and goes where one wanted to go', async () => {
    const visitor = app.visitor();
    const refused = await visitor.get('/machines?sort=name');
    expect(refused.status).toBe(303);
    expect(refused.headers.get('location')).toBe('/sign-in?next=%2Fmachines%3Fsort%3Dname');
    const form = { email: lead.email.toUpperCase(), password: TEST_PASSWORD };
    const signedIn = await visitor.form('/sign-in?next=%2Fmachines%3Fsort%3Dname', form);
    expect(signedIn.status).toBe(303);
    expect(signedIn.headers.get('location')).toBe('/machines?sort=name');
    expect(sessionCookie(signedIn)).toMatch(/HttpOnly/i);
    expect(sessionCookie(signedIn)).toMatch(/SameSite=Lax/i);
    expect(sessionCookie(signedIn)).toMatch(/Path=\//i);
    expect((await visitor.get('/machines')).status).toBe(200);
  });

  it.each(['//evil.example', '/\\evil.example', 'https://evil.example/', 'javascript:alert(1)'])(
    'never leaves the site for %s',
    async (next) => {
      const visitor = app.visitor();
      const form = { email: lead.email, password: TEST_PASSWORD };
      const response = await visitor.form(`/sign-in?next=${encodeURIComponent(next)}`, form);
      expect(response.headers.get('location')).toBe('/machines');
    },
  );

  it('gives one answer for an unknown address and a wrong password', async () => {
    const wrong = await app.visitor().form('/sign-in', { email: lead.email, password: 'not this one at all' });
    const unknown = await app
      .visitor()
      .form('/sign-in', { email: 'nobody@example.org', password: 'not this one at all' });
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    const text = async (response: Response, email: string): Promise<string> =>
      (await response.text()).replaceAll(email, 'E-MAIL');
    expect(await text(wrong, lead.email)).toBe(await text(unknown, 'nobody@example.org'));
  });

  it('refuses a form that comes from elsewhere', async () => {
    const response = await app.visitor().fetch('/sign-in', {
      method: 'POST',
      headers: { origin: 'https://evil.example' },
      body: new URLSearchParams({ email: lead.email, password: TEST_PASSWORD }),
    });
    expect(response.status).toBe(403);
  });

  it("lets nobody in through the library's own routes", async () => {
    const visitor = app.visitor();
    const { csrfToken } = (await (await visitor.get('/api/auth/csrf')).json()) as { csrfToken: string };
    const form = { email: lead.email, password: TEST_PASSWORD, csrfToken };
    const response = await visitor.form('/api/auth/callback/credentials', form);
    expect(sessionCookie(response)).toBe('');
    expect((await visitor.get('/machines')).status).toBe(303);
  });

  it('stops guessing at one account after five wrong passwords, and says when to come back', async () => {
    const victim = await newPerson(app, lead, 'viewer');
    const guess = (): Promise<Response> =>
      app.visitor().form('/sign-in', { email: victim.email, password: 'a wrong guess, again' });
    for (let tries = 0; tries < 5; tries += 1) expect((await guess()).status).toBe(401);
    const blocked = await guess();
    expect(blocked.status).toBe(429);
    expect(Number(blocked.headers.get('retry-after'))).toBeGreaterThan(60);
    // The right password does not open it either while it is blocked: a guesser would learn it.
    expect((await app.visitor().form('/sign-in', { email: victim.email, password: TEST_PASSWORD })).status).toBe(429);
  });

  it('keeps no e-mail address in the table of attempts', async () => {
    const { db } = connectTo(app.database);
    const rows = await db.select().from(schema.rateLimit);
    expect(rows.length).toBeGreaterThan(0);
    expect(JSON.stringify(rows)).not.toContain('@');
  });
});

describe('a session', () => {
  it('is over at once when its row is gone, whatever the token says', async () => {
    const person = await newPerson(app, lead, 'tester');
    expect((await person.visitor.get('/machines')).status).toBe(200);
    const stolen = new Map(person.visitor.cookies);
    expect((await person.visitor.form('/sign-out', {})).status).toBe(303);
    expect((await person.visitor.get('/machines')).status).toBe(303);
    const thief = app.visitor();
    for (const [name, value] of stolen) thief.cookies.set(name, value);
    expect((await thief.get('/machines')).status).toBe(303);
    expect((await thief.get('/api/v1/machines')).status).toBe(401);
  });

  it('follows a changed role at the next request', async () => {
    const person = await newPerson(app, lead, 'tester');
    const people = (await (await lead.visitor.get('/api/v1/people')).json()) as {
      people: { id: string; email: string }[];
    };
    const id = people.people.find(({ email }) => email === person.email)?.id;
    expect((await person.visitor.send('POST', '/api/v1/invitations', {})).status).toBe(403);
    expect((await lead.visitor.send('PATCH', `/api/v1/people/${id}`, { role: 'lead' })).status).toBe(204);
    const made = await person.visitor.send('POST', '/api/v1/invitations', {
      email: 'x@example.org',
      name: 'X',
      role: 'viewer',
    });
    expect(made.status).toBe(201);
    expect((await lead.visitor.send('DELETE', `/api/v1/people/${id}`)).status).toBe(204);
    expect((await person.visitor.get('/api/v1/people')).status).toBe(401);
  });

  it('carries no name, role or address in its token row beyond what it needs', async () => {
    const { db } = connectTo(app.database);
    // Outside a scope the wall shows nothing of any of it.
    for (const table of ['session', 'credential', 'person', 'membership', 'workshop', 'invitation'])
      expect(await db.execute(sql.raw(`select * from ${table}`))).toHaveLength(0);
  });

  it('changes the password only with the old one, and then signs the other browsers out', async () => {
    const person = await newPerson(app, lead, 'tester');
    const other = app.visitor();
    await other.signIn(person.email);
    expect((await other.get('/machines')).status).toBe(200);
    const change = (current: string): Promise<Response> =>
      person.visitor.form('/account', { deed: 'password', current, password: 'a row of brass carry pins' });
    expect((await change('not my password now')).status).toBe(400);
    expect((await change(TEST_PASSWORD)).status).toBe(303);
    expect((await person.visitor.get('/machines')).status).toBe(200);
    expect((await other.get('/machines')).status).toBe(303);
    expect((await app.visitor().form('/sign-in', { email: person.email, password: TEST_PASSWORD })).status).toBe(401);
  });
});

describe('a new password', () => {
  it.each([
    ['too short', 'At least 15 characters'],
    ['aaaaaaaaaaaaaaaaaaaa', 'repeats one short piece'],
    ['nineovernineover1', 'Little is left'],
    ['1234567890123456789', 'run of neighbouring keys'],
  ])('%s is refused with a reason', async (password, reason) => {
    const form = { workshop: 'Any', name: 'Any', email: 'any@example.org', zone: 'UTC', password };
    const response = await app.visitor().form('/sign-up', form);
    expect(response.status).toBe(400);
    expect(await response.text()).toContain(reason);
  });

  it('may be long, in any script', async () => {
    const password = '九の車が回ると次の車が一つ進む🙂';
    const form = { workshop: 'Any', name: 'Any', email: 'script@example.org', zone: 'Asia/Tokyo', password };
    expect((await app.visitor().form('/sign-up', form)).status).toBe(303);
    expect((await app.visitor().form('/sign-in', { email: 'script@example.org', password })).status).toBe(303);
  });
});

describe('making a workshop with an address that has an account', () => {
  it('needs that account’s password', async () => {
    const form = { workshop: 'Second bench', name: 'Lead', email: lead.email, zone: 'UTC' };
    expect((await app.visitor().form('/sign-up', { ...form, password: 'some other password' })).status).toBe(400);
    const visitor = app.visitor();
    expect((await visitor.form('/sign-up', { ...form, password: TEST_PASSWORD })).status).toBe(303);
    const page = await (await visitor.get('/account')).text();
    expect(page).toContain('Second bench');
    expect(page).toContain('Reed bench');
  });
});
