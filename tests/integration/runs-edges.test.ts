import { newPerson, newWorkshop, startApp, type TestApp, type TestPerson } from '@tests/helpers/app';
import { v7 } from 'uuid';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Step } from '@/lib/mechanism/steps';
import { type CheckedFile, checkedFileSchema } from '@/lib/schemas/import-shapes';
import {
  type Logged,
  loggedSchema,
  type RunList,
  type RunShown,
  type RunSummary,
  runListSchema,
  runSchema,
  runSummarySchema,
} from '@/lib/schemas/run-shapes';

let app: TestApp;
let lead: TestPerson;
let tester: TestPerson;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Far corners');
  tester = await newPerson(app, lead, 'tester');
});

async function newMachine(name: string, layout: object = {}): Promise<string> {
  const made = await lead.visitor.send('POST', '/api/v1/machines', { name, layout });
  expect(made.status, await made.clone().text()).toBe(201);
  return ((await made.json()) as { id: string }).id;
}

async function begin(machine: string, more: object = {}): Promise<string> {
  const made = await tester.visitor.send('POST', '/api/v1/runs', { machine, ...more });
  expect(made.status, await made.clone().text()).toBe(201);
  return ((await made.json()) as { id: string }).id;
}

const TURN: Step = { do: 'turn', way: 'add', times: 1 };
const append = (run: string, seq: number, entries: unknown[]): Promise<Response> =>
  tester.visitor.send('POST', `/api/v1/runs/${run}/steps`, { seq, entries });
const correct = (run: string, body: unknown): Promise<Response> =>
  tester.visitor.send('POST', `/api/v1/runs/${run}/corrections`, body);
const shown = async (run: string): Promise<RunShown> =>
  (await (await tester.visitor.get(`/api/v1/runs/${run}`)).json()) as RunShown;

function sendFile(address: string, text: string, query: Record<string, string>): Promise<Response> {
  return tester.visitor.fetch(`${address}?${new URLSearchParams(query)}`, {
    method: 'POST',
    headers: { 'content-type': 'text/csv' },
    body: new TextEncoder().encode(text),
  });
}

async function store(text: string, machine: string, name: string): Promise<RunSummary> {
  const checked = (await (await sendFile('/api/v1/imports/check', text, { machine, name })).json()) as CheckedFile;
  expect(checked.problems).toEqual([]);
  const stored = await sendFile('/api/v1/imports', text, { machine, name, sha256: checked.sha256 });
  expect(stored.status, await stored.clone().text()).toBe(201);
  return (await stored.json()) as RunSummary;
}

describe('a machine without a counter', () => {
  it('takes an empty counter for none, in a start, a reading and a correction', async () => {
    const machine = await newMachine('Countless', { counterWheels: 0 });
    const run = await begin(machine, { start: { result: '5', counter: '' } });
    expect((await shown(run)).start).toEqual({ result: '00000000005' });
    const answer = await append(run, 1, [
      { id: v7(), step: { ...TURN, read: { result: '5', counter: '' } } },
      { id: v7(), step: { ...TURN, read: { counter: '' } } },
    ]);
    expect(answer.status, await answer.clone().text()).toBe(200);
    const { run: summary, entries } = (await answer.json()) as Logged;
    expect(entries.map(({ step }) => step.read)).toEqual([{ result: '00000000005' }, undefined]);
    expect(summary).toMatchObject({ readings: 1, disagreeing: 0 });
    const nothing = await correct(run, { seq: 2, reading: { counter: '' } });
    expect(nothing.status).toBe(400);
    expect((await correct(run, { seq: 2, reading: { result: '5', counter: '' } })).status).toBe(201);
  });
});

describe('a correction', () => {
  it('points at what is wrong in its own body', async () => {
    const run = await begin(await newMachine('Pointer'));
    await append(run, 1, [{ id: v7(), step: { ...TURN, read: { result: '0' } } }]);
    const answer = await correct(run, { seq: 1, reading: { result: '1,5' }, reason: 'Misread.' });
    expect(answer.status).toBe(400);
    const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
    expect(errors.map(({ pointer }) => pointer)).toEqual(['/reading/result']);
  });

  it('that changes nothing is answered and not stored, so that sending it again is harmless', async () => {
    const run = await begin(await newMachine('Twice told'));
    await append(run, 1, [{ id: v7(), step: { ...TURN, read: { result: '1' } } }]);
    const before = (await shown(run)).entries[0]?.readingId;
    const body = { seq: 1, reading: { result: '0' }, reason: 'Misread.', replaces: before };
    expect((await correct(run, body)).status).toBe(201);
    expect((await correct(run, body)).status).toBe(201);
    expect((await shown(run)).entries[0]?.corrections).toHaveLength(1);
  });

  it('that adds a reading leaves the step what it was when it is sent again', async () => {
    const run = await begin(await newMachine('Later'));
    const entry = { id: v7(), step: TURN };
    expect((await append(run, 1, [entry])).status).toBe(200);
    expect((await correct(run, { seq: 1, reading: { result: '0' } })).status).toBe(201);
    expect((await append(run, 1, [entry])).status).toBe(200);
    // A reading that was changed before it was sent again is not swallowed.
    expect((await append(run, 1, [{ ...entry, step: { ...TURN, read: { result: '1' } } }])).status).toBe(409);
  });
});

describe('a step sent again', () => {
  it('is answered after the run was finished and after it was taken back', async () => {
    const run = await begin(await newMachine('Late answer'));
    const entries = [
      { id: v7(), step: TURN },
      { id: v7(), step: TURN },
    ];
    expect((await append(run, 1, entries)).status).toBe(200);
    await tester.visitor.send('DELETE', `/api/v1/runs/${run}/steps/2`, { reason: 'One too many.' });
    await tester.visitor.send('POST', `/api/v1/runs/${run}/finish`);
    const again = await append(run, 1, entries);
    expect(again.status, await again.clone().text()).toBe(200);
    expect(((await again.json()) as Logged).entries.map(({ withdrawn }) => withdrawn?.why)).toEqual([
      undefined,
      'One too many.',
    ]);
  });
});

describe('a time', () => {
  it.each([
    '0001-01-01T00:00:00Z',
    '0050-03-01T08:15:00.500Z',
    '0099-12-31T23:59:59+23:59',
    '9999-12-31T23:59:59.999Z',
  ])('%s comes back as it was', async (time) => {
    const header = 'step,do,slides,carriage,way,times,reverse,clear,result,counter,time,note';
    const text = `${header}\r\n1,turn,,,add,1,,,,,${time},\r\n`;
    const run = await store(text, await newMachine(`Clock ${time}`), 'times.csv');
    const answer = await tester.visitor.get(`/api/v1/runs/${run.id}/csv`);
    expect(await answer.text()).toBe(text);
    // A clock that runs ahead does not let a run end before it began.
    expect(Date.parse(run.startedAt)).toBeLessThanOrEqual(Date.parse(run.finishedAt ?? ''));
  });
});

describe('a file’s name', () => {
  it('loses what no page and no header should meet, and never half a character', async () => {
    const machine = await newMachine('Names');
    const name = `${'n'.repeat(79)}\u{1F980}\u0000\n.csv`;
    const run = await store('do,way,note\r\nturn,add,one\r\n', machine, name);
    expect(run.title.isWellFormed()).toBe(true);
    const { file } = await shown(run.id);
    expect(file?.name).toBe(`${'n'.repeat(79)}\u{1F980}.csv`);
    const saved = await tester.visitor.get(`/api/v1/runs/${run.id}/file`);
    expect(saved.headers.get('content-disposition')).toContain("filename*=UTF-8''");
  });

  it('stands in a header in the way of RFC 8187', async () => {
    const run = await store('do,way,note\r\nturn,add,two\r\n', await newMachine('Quotes'), "it's (one)*.csv");
    const saved = await tester.visitor.get(`/api/v1/runs/${run.id}/file`);
    expect(saved.headers.get('content-disposition')).toContain("filename*=UTF-8''it%27s%20%28one%29%2A.csv");
  });
});

describe('a file without a step', () => {
  it('is checked, and not stored', async () => {
    const machine = await newMachine('Header only');
    const answer = await sendFile('/api/v1/imports/check', 'step,do\r\n', { machine, name: 'empty.csv' });
    const { rows, sha256, remarks } = (await answer.json()) as CheckedFile;
    expect(rows).toEqual([]);
    expect(remarks.length).toBeGreaterThan(0);
    expect((await sendFile('/api/v1/imports', 'step,do\r\n', { machine, name: 'empty.csv', sha256 })).status).toBe(400);
  });
});

describe('the list of runs', () => {
  it('goes on after the last one with what it answered', async () => {
    const machine = await newMachine('Many');
    const made: string[] = [];
    for (let i = 0; i < 5; i += 1) made.unshift(await begin(machine));
    const seen: string[] = [];
    let before = '';
    do {
      const query = new URLSearchParams({ machine, limit: '2', ...(before && { before }) });
      const answer = await tester.visitor.get(`/api/v1/runs?${query}`);
      expect(answer.status, await answer.clone().text()).toBe(200);
      const { runs, next } = (await answer.json()) as RunList;
      expect(runs.length).toBeLessThanOrEqual(2);
      seen.push(...runs.map(({ id }) => id));
      before = next ?? '';
    } while (before);
    expect(seen).toEqual(made);
    for (const bad of ['limit=0', 'limit=x', 'before=12'])
      expect((await tester.visitor.get(`/api/v1/runs?${bad}`)).status).toBe(400);
    expect((await tester.visitor.get(`/api/v1/runs?before=${v7()}`)).status).toBe(404);
  });
});

describe('an answer', () => {
  it('is what the published schemas say, field by field', async () => {
    const machine = await newMachine('As published');
    const text = 'do,way,result,time,note\r\nturn,add,7,2026-03-01T09:15:00+01:00,stiff\r\n';
    const query = { machine, name: 'published.csv' };
    const checked: unknown = await (await sendFile('/api/v1/imports/check', text, query)).json();
    expect(checkedFileSchema.parse(checked)).toEqual(checked);
    const summary = await store(text, machine, 'published.csv');
    expect(runSummarySchema.parse(summary)).toEqual(summary);
    const run = await begin(machine, { title: 'Published', start: { result: '5' } });
    const entry = {
      id: v7(),
      step: { ...TURN, read: { result: '5~' } },
      at: { instant: '2026-03-01T08:15:00Z', offsetMinutes: 60 },
    };
    const added: unknown = await (await append(run, 1, [entry])).json();
    expect(loggedSchema.parse(added)).toEqual(added);
    const corrected = { seq: 1, reading: { result: '5', counter: '1' }, reason: 'Looked again.' };
    const put: unknown = await (await correct(run, corrected)).json();
    expect(loggedSchema.parse(put)).toEqual(put);
    await append(run, 2, [{ id: v7(), step: TURN }]);
    await tester.visitor.send('DELETE', `/api/v1/runs/${run}/steps/2`, { reason: 'One too many.' });
    for (const id of [run, summary.id]) {
      const whole = await shown(id);
      expect(runSchema.parse(whole)).toEqual(whole);
    }
    const list: unknown = await (await tester.visitor.get('/api/v1/runs')).json();
    expect(runListSchema.parse(list)).toEqual(list);
  });
});

describe('a long run', () => {
  it('takes another step quickly', async () => {
    const run = await begin(await newMachine('Long'));
    for (let from = 0; from < 5000; from += 500)
      await append(
        run,
        from + 1,
        Array.from({ length: 500 }, () => ({ id: v7(), step: { ...TURN, read: { result: '0' } } })),
      );
    const took: number[] = [];
    for (let i = 0; i < 9; i += 1) {
      const began = performance.now();
      expect((await append(run, 5001 + i, [{ id: v7(), step: TURN }])).status).toBe(200);
      took.push(performance.now() - began);
    }
    const middle = took.sort((a, b) => a - b)[4] ?? 0;
    expect(middle).toBeLessThan(1500);
  });
});
