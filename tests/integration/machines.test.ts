import { newPerson, newWorkshop, startApp, type TestApp, type TestPerson } from '@tests/helpers/app';
import { beforeAll, describe, expect, it } from 'vitest';
import type { MachineShown } from '@/lib/schemas/machine-shapes';

let app: TestApp;
let lead: TestPerson;
let builder: TestPerson;
let tester: TestPerson;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Reed bench');
  builder = await newPerson(app, lead, 'builder');
  tester = await newPerson(app, lead, 'tester');
});

async function enter(name: string, more: object = {}): Promise<MachineShown> {
  const made = await lead.visitor.send('POST', '/api/v1/machines', { name, ...more });
  expect(made.status, await made.clone().text()).toBe(201);
  return (await made.json()) as MachineShown;
}

const read = async (id: string): Promise<MachineShown> =>
  (await (await lead.visitor.get(`/api/v1/machines/${id}`)).json()) as MachineShown;

const change = (id: string, body: object, who = lead): Promise<Response> =>
  who.visitor.send('PATCH', `/api/v1/machines/${id}`, body);

describe('a machine', () => {
  it('takes the usual layout where none is given, and refuses one that no machine can have', async () => {
    const { layout } = await enter('Usual');
    expect(layout).toMatchObject({ settingSlides: 8, resultWheels: 11, counterWheels: 6, carriagePositions: 6 });
    const bad = await lead.visitor.send('POST', '/api/v1/machines', { name: 'Bad', layout: { resultWheels: 40 } });
    expect(bad.status).toBe(400);
    const { errors } = (await bad.json()) as { errors: { pointer: string }[] };
    expect(errors[0]?.pointer).toBe('/layout/resultWheels');
  });

  it('has a name of its own in the workshop, whatever its case', async () => {
    await enter('Heron');
    const again = await lead.visitor.send('POST', '/api/v1/machines', { name: 'HERON' });
    expect(again.status).toBe(409);
    const elsewhere = await newWorkshop(app, 'Elsewhere');
    expect((await elsewhere.visitor.send('POST', '/api/v1/machines', { name: 'Heron' })).status).toBe(201);
  });

  it('changes its layout in place until a run refers to it, then in a new revision', async () => {
    const machine = await enter('Revised');
    expect((await change(machine.id, { version: 1, layout: { resultWheels: 12 } })).status).toBe(200);
    const unused = await read(machine.id);
    expect([unused.layoutRevision, unused.layout.resultWheels]).toEqual([1, 12]);
    const begun = await tester.visitor.send('POST', '/api/v1/runs', { machine: machine.id });
    const run = (await begun.json()) as { id: string };
    expect((await change(machine.id, { version: 2, layout: { resultWheels: 13 } })).status).toBe(200);
    const used = await read(machine.id);
    expect(used.layoutRevision).toBe(2);
    expect(used.revisions.map(({ revision, layout }) => [revision, layout.resultWheels])).toEqual([
      [2, 13],
      [1, 12],
    ]);
    const kept = (await (await tester.visitor.get(`/api/v1/runs/${run.id}`)).json()) as {
      layout: { resultWheels: number };
    };
    expect(kept.layout.resultWheels).toBe(12);
  });

  it('begins no run on a layout that is just being changed', async () => {
    const machine = await enter('Raced');
    const [begun] = await Promise.all([
      tester.visitor.send('POST', '/api/v1/runs', { machine: machine.id }),
      change(machine.id, { version: 1, layout: { resultWheels: 14 } }),
    ]);
    const run = (await begun.json()) as { layoutRevision: number; layout: { resultWheels: number } };
    const { revisions } = await read(machine.id);
    // Whoever came first, the run's layout is the one its revision still has.
    const kept = revisions.find(({ revision }) => revision === run.layoutRevision);
    expect(kept?.layout.resultWheels).toBe(run.layout.resultWheels);
  });

  it('loses no change of somebody else', async () => {
    const machine = await enter('Shared');
    const both = await Promise.all([
      change(machine.id, { version: 1, note: 'One.' }),
      change(machine.id, { version: 1, note: 'Other.' }),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect((await change(machine.id, { note: 'Unseen.' })).status).toBe(400);
  });

  it('is managed by leads only, on its page as in the interface', async () => {
    const machine = await enter('Guarded');
    for (const who of [builder, tester]) {
      expect((await change(machine.id, { version: 1, name: 'Mine' }, who)).status).toBe(403);
      expect((await who.visitor.get('/machines/new')).status).toBe(403);
      expect((await who.visitor.get(`/machines/${machine.id}/edit`)).status).toBe(403);
      const form = { deed: 'state', state: 'accepted', version: '1' };
      expect((await who.visitor.form(`/machines/${machine.id}`, form)).status).toBe(403);
      expect((await who.visitor.get(`/machines/${machine.id}`)).status).toBe(200);
    }
    expect(
      (await lead.visitor.form(`/machines/${machine.id}`, { deed: 'state', state: 'accepted', version: '1' })).status,
    ).toBe(303);
    expect((await read(machine.id)).state).toBe('accepted');
  });
});

describe('a position left out', () => {
  it('is the builder’s to change, once at a time, with its reason and end kept', async () => {
    const { id } = await enter('Excluded');
    const place = { register: 'result', wheel: 2, reason: 'Gear not fixed yet.', since: '2026-01-05' };
    const of = `/api/v1/machines/${id}/exclusions`;
    expect((await tester.visitor.send('POST', of, place)).status).toBe(403);
    const made = await builder.visitor.send('POST', of, place);
    expect(made.status).toBe(201);
    expect((await builder.visitor.send('POST', of, place)).status).toBe(409);
    expect((await builder.visitor.send('POST', of, { ...place, wheel: 12 })).status).toBe(400);
    expect((await builder.visitor.send('POST', of, { ...place, wheel: 3, since: '2999-01-01' })).status).toBe(400);
    const one = `${of}/${((await made.json()) as { id: string }).id}`;
    expect((await builder.visitor.send('PATCH', one, { ended: true })).status).toBe(200);
    expect((await builder.visitor.send('PATCH', one, { ended: true })).status).toBe(409);
    expect((await builder.visitor.send('POST', of, place)).status).toBe(201);
    const { exclusions } = await read(id);
    expect(exclusions.map(({ endedAt }) => endedAt === null).sort()).toEqual([false, true]);
  });

  it('is left out and counted again on the machine’s page', async () => {
    const { id } = await enter('By page');
    const page = `/machines/${id}`;
    const form = { deed: 'exclude', place: 'counter 1', reason: 'Wheel missing.', since: '2026-02-01' };
    expect((await builder.visitor.form(page, form)).status).toBe(303);
    expect(await (await builder.visitor.get(page)).text()).toContain('Wheel missing.');
    expect((await builder.visitor.form(page, { ...form, place: 'counter 2', reason: '' })).status).toBe(400);
    const [open] = (await read(id)).exclusions;
    expect((await builder.visitor.form(page, { deed: 'include', id: open?.id ?? '' })).status).toBe(303);
    expect((await read(id)).openExclusions).toBe(0);
  });

  it('must be ended before its wheel can go', async () => {
    const { id } = await enter('Shrinking');
    await lead.visitor.send('POST', `/api/v1/machines/${id}/exclusions`, {
      register: 'result',
      wheel: 11,
      reason: 'Off.',
    });
    const answer = await change(id, { version: 1, layout: { resultWheels: 10 } });
    expect(answer.status).toBe(400);
    expect(((await answer.json()) as { errors: { detail: string }[] }).errors[0]?.detail).toContain('excluded');
  });
});
