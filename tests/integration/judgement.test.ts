import { readFileSync } from 'node:fs';
import path from 'node:path';
import { startApp, type TestApp } from '@tests/helpers/app';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Comparison } from '@/lib/comparison/compare';

const golden = <T>(name: string): T =>
  JSON.parse(readFileSync(path.resolve(import.meta.dirname, `../../fixtures/golden/${name}.json`), 'utf8')) as T;

let app: TestApp;
beforeAll(async () => {
  app = await startApp();
});

/** Each caller is an address of its own to the limiter only from outside; the tests keep below it. */
const post = (name: string, body: unknown): Promise<Response> => app.visitor().send('POST', `/api/v1/${name}`, body);

const WHEEL_FIELDS = [
  'wheel',
  'read',
  'expected',
  'expectedFromLast',
  'verdict',
  'stepsOff',
  'carryDue',
  'carryMade',
].sort();

describe('POST /api/v1/simulate', () => {
  it('answers the golden cases', async () => {
    const cases = golden<{ body: object; states: unknown[] }[]>('simulate');
    expect(cases.length).toBeGreaterThan(100);
    for (const { body, states } of cases) {
      const answer = await post('simulate', body);
      expect(answer.status).toBe(200);
      expect(await answer.json()).toEqual({ states });
    }
  }, 120_000);

  it('runs by chance from a seed, the same one the same way', async () => {
    const body = {
      faults: [{ kind: 'carry-missed', wheel: 2, rate: 0.5 }],
      seed: 7,
      steps: [
        { do: 'set', slides: '7' },
        { do: 'turn', way: 'add', times: 100 },
      ],
    };
    const one = await (await post('simulate', body)).json();
    expect(await (await post('simulate', body)).json()).toEqual(one);
    const { seed: _, ...without } = body;
    const refused = await post('simulate', without);
    expect(refused.status).toBe(400);
    expect(((await refused.json()) as { errors: { pointer: string }[] }).errors[0]?.pointer).toBe('/seed');
  });

  it.each([
    ['an unknown step', { steps: [{ do: 'jump' }] }, '/steps/0'],
    ['a digit beyond the slides', { steps: [{ do: 'set', slides: '123456789' }] }, '/steps/0/slides'],
    ['a carriage beyond its positions', { steps: [{ do: 'shift', to: 7 }] }, '/steps/0/to'],
    ['a layout outside its limits', { layout: { resultWheels: 33 }, steps: [] }, '/layout/resultWheels'],
    [
      'a layout that does not subtract',
      { layout: { subtraction: 'none' }, steps: [{ do: 'turn', way: 'subtract' }] },
      '/steps/0/way',
    ],
    ['a field nobody knows', { steps: [], colour: 'red' }, '/colour'],
    ['a million turns and one', { steps: [{ do: 'turn', way: 'add', times: 1_000_001 }] }, '/steps/0/times'],
  ])('refuses %s at its place, with the cure', async (_, body, pointer) => {
    const answer = await post('simulate', body);
    expect(answer.status).toBe(400);
    expect(answer.headers.get('content-type')).toBe('application/problem+json');
    const problem = (await answer.json()) as { errors: { pointer: string; detail: string }[]; status: number };
    expect(problem.status).toBe(400);
    expect(problem.errors.some((error) => error.pointer.startsWith(pointer) && error.detail.length > 8)).toBe(true);
  });

  it('refuses what is no JSON, too large, or of another type, without a 500', async () => {
    const visitor = app.visitor();
    const raw = (body: string, type = 'application/json'): Promise<Response> =>
      visitor.fetch('/api/v1/simulate', { method: 'POST', headers: { 'content-type': type }, body });
    expect((await raw('{')).status).toBe(400);
    expect((await raw('[]')).status).toBe(400);
    expect((await raw(`{"steps":[]${' '.repeat(1024 * 1024)}}`)).status).toBe(413);
    expect((await raw('{}', 'text/plain')).status).toBe(415);
    expect((await visitor.get('/api/v1/simulate')).status).toBeGreaterThanOrEqual(404);
  });
});

describe('POST /api/v1/compare', () => {
  it('answers the golden cases, every wheel with the fields of the contract', async () => {
    interface Case {
      readonly body: object;
      readonly readings: {
        readonly step: number;
        readonly expected: Record<'result' | 'counter', string>;
        readonly expectedFromLast: Record<'result' | 'counter', string>;
        readonly missed: number | null;
      }[];
    }
    for (const { body, readings } of golden<Case[]>('compare')) {
      const answer = (await (await post('compare', body)).json()) as Comparison;
      expect(answer.readings.map(({ step }) => step)).toEqual(readings.map(({ step }) => step));
      answer.readings.forEach((judged, index) => {
        const told = readings[index];
        for (const register of ['result', 'counter'] as const) {
          const wheels = [...judged[register]].reverse();
          expect(wheels.map(({ expected }) => expected).join('')).toBe(told?.expected[register]);
          expect(wheels.map(({ expectedFromLast }) => expectedFromLast).join('')).toBe(
            told?.expectedFromLast[register],
          );
          for (const wheel of wheels) expect(Object.keys(wheel).sort()).toEqual(WHEEL_FIELDS);
        }
        const missed = judged.result.filter(({ carryDue, carryMade }) => carryDue && carryMade === false);
        expect(missed.map(({ wheel }) => wheel)).toEqual(told?.missed === null ? [] : [told?.missed]);
      });
      expect(answer.agrees).toBe(answer.firstFault === null);
    }
  }, 60_000);

  it('refuses an exponent with what to do about it', async () => {
    const steps = [{ do: 'turn', way: 'add', read: { result: '1.23457E+14' } }];
    const answer = await post('compare', { steps });
    expect(answer.status).toBe(400);
    const { errors } = (await answer.json()) as { errors: { pointer: string; detail: string }[] };
    expect(errors[0]?.pointer).toBe('/steps/0/read/result');
    expect(errors[0]?.detail).toMatch(/spreadsheet|text/i);
  });
});

describe('GET /api/v1', () => {
  it('describes itself as OpenAPI 3.1 with the calls in it', async () => {
    const document = (await (await app.visitor().get('/api/v1/openapi.json')).json()) as {
      openapi: string;
      paths: Record<string, object>;
    };
    expect(document.openapi).toMatch(/^3\.1\./);
    for (const name of ['simulate', 'compare', 'health'])
      expect(Object.keys(document.paths)).toContain(`/api/v1/${name}`);
  });

  it('answers an unknown address and a wrong method in its own form', async () => {
    const nothing = await app.visitor().get('/api/v1/nothing');
    expect([nothing.status, nothing.headers.get('content-type')]).toEqual([401, 'application/problem+json']);
  });
});
