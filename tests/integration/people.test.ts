import { newPerson, newWorkshop, startApp, TEST_PASSWORD, type TestApp, type TestPerson } from '@tests/helpers/app';
import { connectTo } from '@tests/helpers/database';
import { beforeAll, describe, expect, it } from 'vitest';
import { schema } from '@/lib/server/db/client';
import { scoped } from '@/lib/server/db/scope';

let app: TestApp;
let lead: TestPerson;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Reed bench');
});

interface Person {
  readonly id: string;
  readonly email: string;
  readonly role: string;
}

async function people(who: TestPerson): Promise<Person[]> {
  return ((await (await who.visitor.get('/api/v1/people')).json()) as { people: Person[] }).people;
}

async function idOf(email: string, asker = lead): Promise<string> {
  const found = (await people(asker)).find((person) => person.email === email);
  if (!found) throw new Error(`${email} is not in the workshop`);
  return found.id;
}

async function link(email: string, role = 'tester'): Promise<{ id: string; path: string }> {
  const made = await lead.visitor.send('POST', '/api/v1/invitations', { email, name: 'New One', role });
  expect(made.status).toBe(201);
  const body = (await made.json()) as { id: string; link: string };
  return { id: body.id, path: new URL(body.link).pathname };
}

const join = (path: string, password = TEST_PASSWORD): Promise<Response> =>
  app.visitor().form(path, { name: 'New One', password });

describe('a one-time link', () => {
  it('lets one person in, once, with the role it was made for', async () => {
    const { path } = await link('once@example.org', 'builder');
    expect(await (await app.visitor().get(path)).text()).toContain('Join Reed bench');
    expect((await join(path)).status).toBe(303);
    const again = await join(path);
    expect(again.status).toBe(410);
    expect(await again.text()).toContain('has been used');
    expect((await people(lead)).find(({ email }) => email === 'once@example.org')?.role).toBe('builder');
  });

  it('lets only one in when two browsers use it at the same moment', async () => {
    const { path } = await link('race@example.org');
    const statuses = (await Promise.all([join(path), join(path)])).map(({ headers }) => headers.get('location'));
    expect(statuses.filter((where) => where === '/machines')).toHaveLength(1);
    expect((await people(lead)).filter(({ email }) => email === 'race@example.org')).toHaveLength(1);
  });

  it('stops working when renewed, taken back or seven days old', async () => {
    const first = await link('renew@example.org');
    const renewed = await lead.visitor.send('POST', `/api/v1/invitations/${first.id}`);
    const newer = new URL(((await renewed.json()) as { link: string }).link).pathname;
    expect((await app.visitor().get(first.path)).status).toBe(404);
    expect((await app.visitor().get(newer)).status).toBe(200);
    expect((await lead.visitor.send('DELETE', `/api/v1/invitations/${first.id}`)).status).toBe(204);
    expect((await join(newer)).status).toBe(410);
    const old = await link('old@example.org');
    await expire(old.id);
    const late = await join(old.path);
    expect(late.status).toBe(410);
    expect(await late.text()).toContain('seven days');
  });

  it('asks somebody who has an account for that account’s password', async () => {
    const elsewhere = await newWorkshop(app, 'Elsewhere');
    const { path } = await link(elsewhere.email, 'viewer');
    expect((await join(path, 'some other password')).status).toBe(400);
    expect((await join(path)).status).toBe(303);
    expect((await people(lead)).find(({ email }) => email === elsewhere.email)?.role).toBe('viewer');
    // Their own workshop is untouched by it.
    expect((await people(elsewhere)).map(({ role }) => role)).toEqual(['lead']);
  });

  it('is refused for somebody who belongs already, and is kept as a hash only', async () => {
    const made = await lead.visitor.send('POST', '/api/v1/invitations', { email: lead.email, name: 'L', role: 'lead' });
    expect(made.status).toBe(409);
    const { path } = await link('hashed@example.org');
    const token = path.split('/').at(-1) ?? '';
    expect(token.length).toBeGreaterThanOrEqual(43);
    const { db } = connectTo(app.database);
    const workshop = await workshopId();
    const rows = await scoped({ workshop }, (tx) => tx.select().from(schema.invitation), db);
    expect(rows.length).toBeGreaterThan(0);
    expect(JSON.stringify(rows)).not.toContain(token);
  });
});

async function workshopId(): Promise<string> {
  const { db } = connectTo(app.database);
  const person = await idOf(lead.email);
  const rows = await scoped({ person }, (tx) => tx.select().from(schema.membership), db);
  const own = rows.find(({ role }) => role === 'lead');
  if (!own) throw new Error('The lead belongs to a workshop.');
  return own.workshopId;
}

async function expire(id: string): Promise<void> {
  const { db } = connectTo(app.database);
  const workshop = await workshopId();
  const { eq } = await import('drizzle-orm');
  await scoped(
    { workshop },
    (tx) =>
      tx
        .update(schema.invitation)
        .set({ expiresAt: new Date(0) })
        .where(eq(schema.invitation.id, id)),
    db,
  );
}

describe('roles', () => {
  it('never leave a workshop without a lead, even when two leads demote each other at once', async () => {
    const first = await newWorkshop(app, 'Two leads');
    const second = await newPerson(app, first, 'lead');
    const [a, b] = [await idOf(first.email, first), await idOf(second.email, first)];
    for (let round = 0; round < 5; round += 1) {
      const answers = await Promise.all([
        first.visitor.send('PATCH', `/api/v1/people/${b}`, { role: 'tester' }),
        second.visitor.send('PATCH', `/api/v1/people/${a}`, { role: 'tester' }),
      ]);
      // One of them wins; the other finds itself the last lead, or no lead any more.
      expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
      const standing = await people(first);
      const leads = standing.filter(({ role }) => role === 'lead');
      expect(leads).toHaveLength(1);
      const [keeper, other] = leads[0]?.id === a ? [first, b] : [second, a];
      expect((await keeper.visitor.send('DELETE', `/api/v1/people/${leads[0]?.id}`)).status).toBe(409);
      expect((await keeper.visitor.send('PATCH', `/api/v1/people/${other}`, { role: 'lead' })).status).toBe(204);
    }
  });

  it('let only a lead manage people, on the pages as in the interface', async () => {
    for (const role of ['tester', 'builder', 'viewer'] as const) {
      const person = await newPerson(app, lead, role);
      const id = await idOf(lead.email);
      expect((await person.visitor.get('/people')).status).toBe(200);
      expect((await person.visitor.form('/people', { deed: 'remove', id, name: 'x' })).status).toBe(403);
      expect((await person.visitor.send('PATCH', `/api/v1/people/${id}`, { role: 'viewer' })).status).toBe(403);
      expect((await person.visitor.send('DELETE', `/api/v1/people/${id}`)).status).toBe(403);
      expect((await person.visitor.get('/api/v1/invitations')).status).toBe(403);
    }
  });

  it('of another workshop cannot be touched: its ids lead nowhere', async () => {
    const other = await newWorkshop(app, 'Neighbours');
    const id = await idOf(lead.email);
    expect((await other.visitor.send('PATCH', `/api/v1/people/${id}`, { role: 'viewer' })).status).toBe(404);
    expect((await other.visitor.send('DELETE', `/api/v1/people/${id}`)).status).toBe(404);
    const { id: invitation } = await link('walls@example.org');
    expect((await other.visitor.send('POST', `/api/v1/invitations/${invitation}`)).status).toBe(404);
    expect((await other.visitor.send('DELETE', `/api/v1/invitations/${invitation}`)).status).toBe(404);
  });
});

describe('the people page', () => {
  it('shows a new link once, and not again on reloading', async () => {
    const form = { deed: 'invite', email: 'page@example.org', name: 'Page Person', role: 'tester' };
    expect((await lead.visitor.form('/people', form)).status).toBe(303);
    expect(await (await lead.visitor.get('/people')).text()).toMatch(/\/invitation\/[\w-]{43}/);
    expect(await (await lead.visitor.get('/people')).text()).not.toMatch(/\/invitation\/[\w-]{43}/);
  });

  it('keeps what was typed when something is wrong', async () => {
    const response = await lead.visitor.form('/people', {
      deed: 'invite',
      email: 'nonsense',
      name: 'Kept',
      role: 'tester',
    });
    expect(response.status).toBe(400);
    const text = await response.text();
    expect(text).toContain('This is not an e-mail address.');
    expect(text).toContain('value="Kept"');
  });
});
