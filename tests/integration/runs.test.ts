import { newPerson, newWorkshop, startApp, type TestApp, type TestPerson } from '@tests/helpers/app';
import { v7 } from 'uuid';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Step } from '@/lib/mechanism/steps';
import type { Logged, RunShown, RunSummary } from '@/lib/schemas/run-shapes';

let app: TestApp;
let lead: TestPerson;
let tester: TestPerson;
let machine: string;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Reed bench');
  tester = await newPerson(app, lead, 'tester');
  machine = await newMachine(lead, 'Heron');
});

async function newMachine(who: TestPerson, name: string): Promise<string> {
  const made = await who.visitor.send('POST', '/api/v1/machines', { name });
  expect(made.status).toBe(201);
  return ((await made.json()) as { id: string }).id;
}

async function begin(who = tester, of = machine): Promise<string> {
  const made = await who.visitor.send('POST', '/api/v1/runs', { machine: of });
  expect(made.status, await made.clone().text()).toBe(201);
  return ((await made.json()) as { id: string }).id;
}

const entry = (step: Step, id = v7()) => ({ id, step });
const TURN = { do: 'turn', way: 'add', times: 1 } as const;
const read = (result: string, counter: string): Step => ({ ...TURN, read: { result, counter } });

const append = (run: string, seq: number, entries: unknown[], who = tester): Promise<Response> =>
  who.visitor.send('POST', `/api/v1/runs/${run}/steps`, { seq, entries });

async function shown(run: string, who = tester): Promise<RunShown> {
  return (await (await who.visitor.get(`/api/v1/runs/${run}`)).json()) as RunShown;
}

/** Lowest slide 7, nine turns; the carry into wheel 2 missed once, at turn 5 (common practice's smoke test). */
const SMOKE: Step[] = [
  { do: 'set', slides: '7' },
  ...['7', '14', '21', '28', '25', '32', '39', '46', '53'].map((result, turn) => read(result, String(turn + 1))),
];

describe('a run', () => {
  it('keeps the smoke test with one missed carry, and flags it once', async () => {
    const run = await begin();
    const answer = await append(
      run,
      1,
      SMOKE.map((step) => entry(step)),
    );
    expect(answer.status, await answer.clone().text()).toBe(200);
    const { run: summary, remarks } = (await answer.json()) as Logged;
    expect(summary).toMatchObject({ steps: 10, turns: 9, readings: 9, disagreeing: 1 });
    expect(summary.firstFault).toEqual({ register: 'result', wheel: 2, seq: 6 });
    // What was filled in is said, for every register of every reading.
    expect(remarks).toHaveLength(18);
    const { entries } = await shown(run);
    expect(entries[1]?.step).toEqual(read('00000000007', '000001'));
  });

  it('stores a step once, however often it is sent', async () => {
    const run = await begin();
    const first = entry(SMOKE[0] as Step);
    const second = entry(SMOKE[1] as Step);
    expect((await append(run, 1, [first])).status).toBe(200);
    expect((await append(run, 1, [first, second])).status).toBe(200);
    expect((await append(run, 1, [first, second])).status).toBe(200);
    expect((await shown(run)).entries.map(({ id }) => id)).toEqual([first.id, second.id]);
    // An id stands for one step: something else under it is refused, never taken for the same.
    const other = await append(run, 1, [{ ...first, step: { do: 'set', slides: '8' } }]);
    expect(other.status).toBe(409);
  });

  it('lets one of two browsers have a number, and tells the other', async () => {
    const run = await begin();
    const answers = await Promise.all([append(run, 1, [entry(TURN)]), append(run, 1, [entry(TURN)])]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const refused = answers.find(({ status }) => status === 409);
    const told = (await refused?.json()) as { detail: string };
    expect(told.detail).toContain('Step 1 has been logged already');
    const gap = await append(run, 7, [entry(TURN)]);
    expect(gap.status).toBe(409);
    expect((await shown(run)).entries).toHaveLength(1);
  });

  it('refuses what the machine does not have, with its place, and stores nothing of the batch', async () => {
    const run = await begin();
    const bad = [entry(TURN), entry({ do: 'shift', to: 9 }), entry(read('1.5', '1'))];
    const answer = await append(run, 1, bad);
    expect(answer.status).toBe(400);
    const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
    expect(errors.map(({ pointer }) => pointer)).toEqual(['/entries/1/step/to', '/entries/2/step/read/result']);
    expect((await shown(run)).entries).toHaveLength(0);
  });

  it('keeps what was read first when a reading is put right', async () => {
    const run = await begin();
    await append(
      run,
      1,
      SMOKE.map((step) => entry(step)),
    );
    const correct = (body: unknown): Promise<Response> =>
      tester.visitor.send('POST', `/api/v1/runs/${run}/corrections`, body);
    const reading = { result: '35', counter: '5' };
    expect((await correct({ seq: 6, reading })).status).toBe(400);
    const before = (await shown(run)).entries[5]?.readingId;
    expect((await correct({ seq: 6, reading, reason: 'Misread.', replaces: before })).status).toBe(201);
    // Somebody who still looks at the first reading does not overwrite the correction.
    expect((await correct({ seq: 6, reading, reason: 'Again.', replaces: before })).status).toBe(409);
    const after = await shown(run);
    expect(after.entries[5]?.step.read).toEqual({ result: '00000000035', counter: '000005' });
    expect(after.entries[5]?.corrections).toMatchObject([
      { was: { result: '00000000025', counter: '000005' }, why: 'Misread.' },
    ]);
    expect(after.firstFault).toMatchObject({ seq: 7 });
  });

  it('takes back the last step only, and keeps it in sight', async () => {
    const run = await begin();
    await append(run, 1, [entry(SMOKE[0] as Step), entry(read('8', '1'))]);
    const back = (seq: number): Promise<Response> =>
      tester.visitor.send('DELETE', `/api/v1/runs/${run}/steps/${seq}`, { reason: 'Turned too far.' });
    expect((await back(1)).status).toBe(409);
    expect((await back(2)).status).toBe(200);
    expect((await back(2)).status).toBe(404);
    const state = await shown(run);
    expect(state.entries[1]?.withdrawn).toMatchObject({ why: 'Turned too far.' });
    expect(state).toMatchObject({ steps: 1, turns: 0, readings: 0, disagreeing: 0, firstFault: null });
    expect((await append(run, 3, [entry(read('7', '1'))])).status).toBe(200);
    expect((await shown(run)).disagreeing).toBe(0);
  });

  it('is deleted only while empty, and takes nothing more once finished', async () => {
    const empty = await begin();
    expect((await tester.visitor.send('POST', `/api/v1/runs/${empty}/finish`)).status).toBe(409);
    expect((await tester.visitor.send('DELETE', `/api/v1/runs/${empty}`)).status).toBe(204);
    expect((await tester.visitor.get(`/api/v1/runs/${empty}`)).status).toBe(404);
    const run = await begin();
    await append(run, 1, [entry(TURN)]);
    expect((await tester.visitor.send('DELETE', `/api/v1/runs/${run}`)).status).toBe(409);
    expect((await tester.visitor.send('POST', `/api/v1/runs/${run}/finish`)).status).toBe(200);
    expect((await tester.visitor.send('POST', `/api/v1/runs/${run}/finish`)).status).toBe(200);
    const late = await append(run, 2, [entry(TURN)]);
    expect(late.status).toBe(409);
    expect(((await late.json()) as { detail: string }).detail).toContain('finished');
  });

  it('freezes what was excluded when it began', async () => {
    const of = await newMachine(lead, 'Egret');
    const excluded = { register: 'result', wheel: 2, reason: 'Gear not fixed yet.' };
    expect((await lead.visitor.send('POST', `/api/v1/machines/${of}/exclusions`, excluded)).status).toBe(201);
    const run = await begin(tester, of);
    await append(
      run,
      1,
      SMOKE.map((step) => entry(step)),
    );
    const state = await shown(run);
    expect(state.excluded).toEqual([excluded]);
    expect(state.disagreeing).toBe(0);
  });

  it('counts up within its workshop, also when ten begin at once', async () => {
    const other = await newWorkshop(app, 'Counting');
    const of = await newMachine(other, 'Ibis');
    await Promise.all(Array.from({ length: 10 }, () => begin(other, of)));
    const { runs } = (await (await other.visitor.get('/api/v1/runs')).json()) as { runs: RunSummary[] };
    expect(runs.map(({ number }) => number)).toEqual([10, 9, 8, 7, 6, 5, 4, 3, 2, 1]);
  });

  it('may be read by a viewer and written by none', async () => {
    const viewer = await newPerson(app, lead, 'viewer');
    const run = await begin();
    expect((await viewer.visitor.get(`/api/v1/runs/${run}`)).status).toBe(200);
    expect((await append(run, 1, [entry(TURN)], viewer)).status).toBe(403);
    expect((await viewer.visitor.send('POST', '/api/v1/runs', { machine })).status).toBe(403);
    expect((await viewer.visitor.send('POST', `/api/v1/runs/${run}/finish`)).status).toBe(403);
    expect((await viewer.visitor.send('DELETE', `/api/v1/runs/${run}`)).status).toBe(403);
  });

  it('does not exist for another workshop', async () => {
    const stranger = await newWorkshop(app, 'Neighbours');
    const run = await begin();
    await append(run, 1, [entry(TURN)]);
    const of = `/api/v1/runs/${run}`;
    const { visitor } = stranger;
    const answers = [
      await visitor.get(of),
      await visitor.get(`${of}/csv`),
      await visitor.get(`${of}/file`),
      await visitor.send('PATCH', of, { title: 'Mine' }),
      await visitor.send('DELETE', of),
      await visitor.send('POST', `${of}/steps`, { seq: 2, entries: [entry(TURN)] }),
      await visitor.send('DELETE', `${of}/steps/1`, { reason: 'Mine.' }),
      await visitor.send('POST', `${of}/corrections`, { seq: 1, reading: { result: '1' } }),
      await visitor.send('POST', `${of}/finish`),
      await visitor.send('POST', '/api/v1/runs', { machine }),
    ];
    expect(answers.map(({ status }) => status)).toEqual(answers.map(() => 404));
    expect((await shown(run)).entries).toHaveLength(1);
  });

  it('of ten thousand steps is stored and read in seconds', async () => {
    const run = await begin();
    const began = performance.now();
    for (let from = 0; from < 10_000; from += 500) {
      const part = Array.from({ length: 500 }, () => entry(TURN));
      expect((await append(run, from + 1, part)).status).toBe(200);
    }
    const stored = performance.now() - began;
    const before = performance.now();
    expect((await shown(run)).turns).toBe(10_000);
    const over = await append(run, 10_001, [entry(TURN)]);
    expect(over.status).toBe(409);
    expect(((await over.json()) as { detail: string }).detail).toContain('10000 steps');
    expect(performance.now() - before).toBeLessThan(3000);
    expect(stored).toBeLessThan(45_000);
  });
});
