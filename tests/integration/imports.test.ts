import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { newPerson, newWorkshop, startApp, type TestApp, type TestPerson } from '@tests/helpers/app';
import { beforeAll, describe, expect, it } from 'vitest';
import type { CheckedFile } from '@/lib/schemas/import-shapes';
import type { RunShown, RunSummary } from '@/lib/schemas/run-shapes';

const FOLDER = path.resolve(import.meta.dirname, '../../fixtures/runs');
const fixture = (name: string): Buffer => readFileSync(path.join(FOLDER, name));
/** Written as we write them: these come back byte for byte. */
const CANONICAL = ['smoke-test.csv', 'smoke-test-carry-missed.csv', 'nines-ripple.csv'];

let app: TestApp;
let lead: TestPerson;
let tester: TestPerson;
let machine: string;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Reed bench');
  tester = await newPerson(app, lead, 'tester');
  const made = await lead.visitor.send('POST', '/api/v1/machines', { name: 'Heron' });
  machine = ((await made.json()) as { id: string }).id;
});

function send(address: string, bytes: Uint8Array, query: Record<string, string>, who = tester): Promise<Response> {
  const search = new URLSearchParams({ machine, ...query });
  return who.visitor.fetch(`${address}?${search}`, {
    method: 'POST',
    headers: { 'content-type': 'text/csv' },
    body: new Uint8Array(bytes),
  });
}

async function check(bytes: Uint8Array, name: string): Promise<CheckedFile> {
  const answer = await send('/api/v1/imports/check', bytes, { name });
  expect(answer.status, await answer.clone().text()).toBe(200);
  return (await answer.json()) as CheckedFile;
}

async function runs(): Promise<RunSummary[]> {
  return ((await (await tester.visitor.get('/api/v1/runs')).json()) as { runs: RunSummary[] }).runs;
}

async function bytesOf(address: string): Promise<Buffer> {
  return Buffer.from(await (await tester.visitor.get(address)).arrayBuffer());
}

describe('a file of a run', () => {
  it.each(CANONICAL)('%s goes in and comes out byte for byte', async (name) => {
    const bytes = fixture(name);
    const checked = await check(bytes, name);
    expect(checked.problems).toEqual([]);
    const stored = await send('/api/v1/imports', bytes, { name, sha256: checked.sha256 });
    expect(stored.status, await stored.clone().text()).toBe(201);
    const run = (await stored.json()) as RunSummary;
    expect(run).toMatchObject({ source: 'file', steps: checked.rows.length });
    expect(run.finishedAt).not.toBeNull();
    expect(await bytesOf(`/api/v1/runs/${run.id}/csv`)).toEqual(bytes);
    expect(await bytesOf(`/api/v1/runs/${run.id}/file`)).toEqual(bytes);
  });

  it.each(readdirSync(FOLDER).filter((name) => name.endsWith('.csv')))(
    '%s is checked without storing anything',
    async (name) => {
      const before = (await runs()).length;
      const checked = await check(fixture(name), name);
      expect(checked.rows.length + checked.problems.length).toBeGreaterThan(0);
      expect(await runs()).toHaveLength(before);
    },
  );

  it('with one problem is not stored at all', async () => {
    for (const name of ['exponents.csv', 'many-problems.csv']) {
      const before = (await runs()).length;
      const checked = await check(fixture(name), name);
      expect(checked.problems.length).toBeGreaterThan(0);
      for (const { what, cure } of checked.problems) expect([what, cure].every((text) => text.length > 5)).toBe(true);
      expect((await send('/api/v1/imports', fixture(name), { name, sha256: checked.sha256 })).status).toBe(400);
      expect(await runs()).toHaveLength(before);
    }
  });

  it('with another dialect says so, comes out in ours, and is kept as it was', async () => {
    for (const name of ['semicolon-bom.csv', 'tab-lf.csv', 'leading-zeros-stripped.csv']) {
      const bytes = fixture(name);
      const checked = await check(bytes, name);
      expect(checked.problems).toEqual([]);
      expect([...checked.remarks, ...checked.rows.flatMap(({ remarks }) => remarks)].length).toBeGreaterThan(0);
      const stored = await send('/api/v1/imports', bytes, { name, sha256: checked.sha256 });
      const { id } = (await stored.json()) as RunSummary;
      expect(await bytesOf(`/api/v1/runs/${id}/file`)).toEqual(bytes);
      // Our own form of it is read as the very same run, and comes back unchanged.
      const ours = await bytesOf(`/api/v1/runs/${id}/csv`);
      const again = await check(ours, 'ours.csv');
      expect(again.rows.map(({ step, note, at }) => ({ step, note, at }))).toEqual(
        checked.rows.map(({ step, note, at }) => ({ step, note, at })),
      );
    }
  });

  it('that was imported before is recognised, and stored again only when asked for', async () => {
    const bytes = fixture('smoke-test.csv');
    const checked = await check(bytes, 'again.csv');
    expect(checked.already).not.toBeNull();
    expect((await send('/api/v1/imports', bytes, { name: 'again.csv', sha256: checked.sha256 })).status).toBe(409);
    const query = { name: 'again.csv', sha256: checked.sha256, again: 'true' };
    expect((await send('/api/v1/imports', bytes, query)).status).toBe(201);
  });

  it('that is not the checked one is refused', async () => {
    const { sha256 } = await check(fixture('smoke-test.csv'), 'a.csv');
    expect((await send('/api/v1/imports', fixture('nines-ripple.csv'), { name: 'a.csv', sha256 })).status).toBe(409);
  });

  it('that is too large, of a strange type, or no text is refused in words', async () => {
    const large = new Uint8Array(1024 * 1024 + 1).fill(65);
    expect((await send('/api/v1/imports/check', large, { name: 'large.csv' })).status).toBe(413);
    const strange = await tester.visitor.send('POST', `/api/v1/imports/check?machine=${machine}`, {});
    expect(strange.status).toBe(415);
    const checked = await check(Uint8Array.from([0xff, 0xfe, 0x41, 0x00, 0x80]), 'utf16.csv');
    expect(checked.problems).toHaveLength(1);
  });

  it('is not for a viewer, nor for another workshop’s machine', async () => {
    const viewer = await newPerson(app, lead, 'viewer');
    const stranger = await newWorkshop(app, 'Neighbours');
    const bytes = fixture('smoke-test.csv');
    expect((await send('/api/v1/imports/check', bytes, { name: 'a.csv' }, viewer)).status).toBe(403);
    expect((await send('/api/v1/imports/check', bytes, { name: 'a.csv' }, stranger)).status).toBe(404);
    expect((await send('/api/v1/imports', bytes, { name: 'a.csv', sha256: 'x' }, stranger)).status).toBe(404);
  });

  it('shows the run it became, readings and all', async () => {
    const found = (await runs()).find(({ title }) => title === 'smoke-test-carry-missed');
    const run = (await (await tester.visitor.get(`/api/v1/runs/${found?.id}`)).json()) as RunShown;
    expect(run.file?.name).toBe('smoke-test-carry-missed.csv');
    expect(run.disagreeing).toBe(1);
    expect(run.firstFault).toMatchObject({ register: 'result', wheel: 2 });
  });
});
