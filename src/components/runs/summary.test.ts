import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { buildRows } from '@/components/ladder/rows';
import { readRunCsv } from '@/lib/interchange/csv-read';
import { acceptLayout } from '@/lib/mechanism/layout';
import { summarise, summaryFaults, summaryHead } from './summary';

const accepted = acceptLayout({});
if (!accepted.ok) throw new Error('The usual layout is acceptable.');
const layout = accepted.value;

function ofFixture(name: string) {
  const { rows } = readRunCsv(
    readFileSync(new URL(`../../../fixtures/runs/${name}.csv`, import.meta.url), 'utf8'),
    layout,
  );
  return summarise(
    buildRows(
      layout,
      rows.map(({ step }, index) => ({ seq: index + 1, step })),
    ),
  );
}

describe('what a run came to', () => {
  it('says a healthy smoke test in one sentence', () => {
    const summary = ofFixture('smoke-test');
    expect(summaryHead(summary)).toBe('9 turns, 10 readings: all agree.');
    expect(summaryFaults(summary)).toEqual([]);
  });

  it('names the missed carry by step and turn, once', () => {
    const summary = ofFixture('smoke-test-carry-missed');
    expect(summaryHead(summary)).toBe('9 turns, 10 readings: 1 differs.');
    expect(summaryFaults(summary)).toEqual(['Step 7, turn 5: wheel 2 took no carry from wheel 1.']);
  });

  it('says so where nothing was read', () => {
    const rows = buildRows(layout, [{ seq: 1, step: { do: 'turn', way: 'add', times: 2000 } }]);
    expect(summaryHead(summarise(rows))).toBe('2,000 turns, nothing read yet.');
    expect(summaryHead(summarise([]))).toBe('Nothing turned and nothing read yet.');
  });

  it('counts faults beyond the first few', () => {
    const wrong = { do: 'turn', way: 'add', read: { result: '00000000001' } } as const;
    const cleared = { do: 'clear', what: 'both' } as const;
    const entries = Array.from({ length: 14 }, (_, index) => ({
      seq: index + 1,
      step: index % 2 === 0 ? cleared : wrong,
    }));
    const faults = summaryFaults(summarise(buildRows(layout, entries)));
    expect(faults).toHaveLength(6);
    expect(faults.at(-1)).toBe('And 2 more faults further down.');
  });
});
