import { readdirSync } from 'node:fs';
import path from 'node:path';
import { newPerson, newWorkshop, startApp, type TestApp, type TestPerson, type Visitor } from '@tests/helpers/app';
import { v7 } from 'uuid';
import { beforeAll, describe, expect, it } from 'vitest';

/** Every address with an id in it, asked by a lead of another workshop: nothing is there. */

const PAGES = path.resolve(import.meta.dirname, '../../src/pages');

/** Routes with a parameter, as their files say it: `/api/v1/runs/[id]/csv`. */
function routes(folder = PAGES): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const place = path.join(folder, entry.name);
    if (entry.isDirectory()) return routes(place);
    const route = `/${path.relative(PAGES, place)}`.replace(/\.(ts|astro)$/, '').replace(/\/index$/, '');
    return route.includes('[') ? [route] : [];
  });
}

/** The catch-all answers 404 to everybody; a link is opened by whoever holds it, and its own tests see to that. */
const OF_NO_WORKSHOP = ['/api/[...rest]', '/invitation/[token]'];

interface Ids {
  readonly machine: string;
  readonly exclusion: string;
  readonly run: string;
  readonly person: string;
  readonly invitation: string;
}

type Ask = (visitor: Visitor, ids: Ids) => Promise<Response>;
const TURN = { id: v7(), step: { do: 'turn', way: 'add' } };

/** How each route is asked, one entry a method. */
const ASKED: Record<string, readonly Ask[]> = {
  '/machines/[id]': [
    (visitor, { machine }) => visitor.get(`/machines/${machine}`),
    (visitor, { machine }) => visitor.form(`/machines/${machine}`, { deed: 'state', state: 'accepted', version: '1' }),
    (visitor, { machine }) =>
      visitor.form(`/machines/${machine}`, {
        deed: 'exclude',
        place: 'result 3',
        reason: 'Mine.',
        since: '2026-01-01',
      }),
    (visitor, { machine, exclusion }) => visitor.form(`/machines/${machine}`, { deed: 'include', id: exclusion }),
  ],
  '/machines/[id]/edit': [(visitor, { machine }) => visitor.get(`/machines/${machine}/edit`)],
  '/runs/[id]': [
    (visitor, { run }) => visitor.get(`/runs/${run}`),
    (visitor, { run }) => visitor.form(`/runs/${run}`, { deed: 'edit', title: 'Mine', note: '' }),
  ],
  '/api/v1/machines/[id]': [
    (visitor, { machine }) => visitor.get(`/api/v1/machines/${machine}`),
    (visitor, { machine }) => visitor.send('PATCH', `/api/v1/machines/${machine}`, { name: 'Mine', version: 1 }),
  ],
  '/api/v1/machines/[id]/exclusions': [
    (visitor, { machine }) => visitor.get(`/api/v1/machines/${machine}/exclusions`),
    (visitor, { machine }) =>
      visitor.send('POST', `/api/v1/machines/${machine}/exclusions`, { register: 'result', wheel: 3, reason: 'Mine.' }),
  ],
  '/api/v1/machines/[id]/exclusions/[exclusion]': [
    (visitor, { machine, exclusion }) => visitor.get(`/api/v1/machines/${machine}/exclusions/${exclusion}`),
    (visitor, { machine, exclusion }) =>
      visitor.send('PATCH', `/api/v1/machines/${machine}/exclusions/${exclusion}`, { ended: true }),
  ],
  '/api/v1/runs/[id]': [
    (visitor, { run }) => visitor.get(`/api/v1/runs/${run}`),
    (visitor, { run }) => visitor.send('PATCH', `/api/v1/runs/${run}`, { title: 'Mine' }),
    (visitor, { run }) => visitor.send('DELETE', `/api/v1/runs/${run}`),
  ],
  '/api/v1/runs/[id]/steps': [
    (visitor, { run }) => visitor.send('POST', `/api/v1/runs/${run}/steps`, { seq: 2, entries: [TURN] }),
  ],
  '/api/v1/runs/[id]/steps/[seq]': [
    (visitor, { run }) => visitor.send('DELETE', `/api/v1/runs/${run}/steps/1`, { reason: 'Mine.' }),
  ],
  '/api/v1/runs/[id]/corrections': [
    (visitor, { run }) => visitor.send('POST', `/api/v1/runs/${run}/corrections`, { seq: 1, reading: { result: '1' } }),
  ],
  '/api/v1/runs/[id]/finish': [(visitor, { run }) => visitor.send('POST', `/api/v1/runs/${run}/finish`)],
  '/api/v1/runs/[id]/csv': [(visitor, { run }) => visitor.get(`/api/v1/runs/${run}/csv`)],
  '/api/v1/runs/[id]/file': [(visitor, { run }) => visitor.get(`/api/v1/runs/${run}/file`)],
  '/api/v1/people/[id]': [
    (visitor, { person }) => visitor.send('PATCH', `/api/v1/people/${person}`, { role: 'viewer' }),
    (visitor, { person }) => visitor.send('DELETE', `/api/v1/people/${person}`),
  ],
  '/api/v1/invitations/[id]': [
    (visitor, { invitation }) => visitor.send('POST', `/api/v1/invitations/${invitation}`),
    (visitor, { invitation }) => visitor.send('DELETE', `/api/v1/invitations/${invitation}`),
  ],
};

let app: TestApp;
let owner: TestPerson;
let stranger: TestPerson;
let ids: Ids;

async function idFrom(response: Response): Promise<string> {
  expect(response.status, await response.clone().text()).toBeLessThan(300);
  return ((await response.json()) as { id: string }).id;
}

beforeAll(async () => {
  app = await startApp();
  owner = await newWorkshop(app, 'Reed bench');
  stranger = await newWorkshop(app, 'Neighbours');
  const { visitor } = owner;
  const tester = await newPerson(app, owner, 'tester');
  const machine = await idFrom(await visitor.send('POST', '/api/v1/machines', { name: 'Heron' }));
  const excluded = { register: 'result', wheel: 2, reason: 'Not fixed yet.' };
  const exclusion = await idFrom(await visitor.send('POST', `/api/v1/machines/${machine}/exclusions`, excluded));
  const run = await idFrom(await visitor.send('POST', '/api/v1/runs', { machine }));
  await visitor.send('POST', `/api/v1/runs/${run}/steps`, { seq: 1, entries: [{ ...TURN, id: v7() }] });
  const invited = { email: 'open@example.org', name: 'Open', role: 'viewer' };
  const invitation = await idFrom(await visitor.send('POST', '/api/v1/invitations', invited));
  const { people } = (await (await visitor.get('/api/v1/people')).json()) as {
    people: { id: string; email: string }[];
  };
  const person = people.find(({ email }) => email === tester.email)?.id ?? '';
  ids = { machine, exclusion, run, person, invitation };
});

describe('the walls between workshops', () => {
  it('are tried at every route that has an id in its address', () => {
    expect(Object.keys(ASKED).sort()).toEqual(
      routes()
        .filter((route) => !OF_NO_WORKSHOP.includes(route))
        .sort(),
    );
  });

  it.each(Object.keys(ASKED))(
    '%s is not there for a lead of another workshop, nor with an id that is none',
    async (route) => {
      for (const ask of ASKED[route] ?? []) expect((await ask(stranger.visitor, ids)).status).toBe(404);
      const nonsense = { machine: 'x', exclusion: 'x', run: '0', person: '..', invitation: "'--" };
      for (const ask of ASKED[route] ?? [])
        expect((await ask(stranger.visitor, { ...nonsense, person: 'x' })).status).toBe(404);
    },
  );

  it('hold also for what is named in a body or a query', async () => {
    const { visitor } = stranger;
    expect((await visitor.send('POST', '/api/v1/runs', { machine: ids.machine })).status).toBe(404);
    const { runs } = (await (await visitor.get(`/api/v1/runs?machine=${ids.machine}`)).json()) as { runs: unknown[] };
    expect(runs).toEqual([]);
    expect((await visitor.form('/runs/new', { machine: ids.machine, zone: 'UTC' })).status).toBe(404);
  });

  it('have left everything as it was', async () => {
    const { visitor } = owner;
    expect(await (await visitor.get(`/api/v1/machines/${ids.machine}`)).json()).toMatchObject({
      name: 'Heron',
      state: 'being-built',
      openExclusions: 1,
    });
    expect(await (await visitor.get(`/api/v1/runs/${ids.run}`)).json()).toMatchObject({
      steps: 1,
      finishedAt: null,
      title: '',
    });
  });
});
