import { describe, expect, it } from 'vitest';
import { acceptLayout, type Layout, type LayoutDescription } from '@/lib/mechanism/layout';
import type { Step } from '@/lib/mechanism/steps';
import { buildRows, createRowBuilder, type LadderEntry } from './rows';
import { carryMark, readingSentences, shortWords } from './words';

function layoutOf(description: LayoutDescription): Layout {
  const accepted = acceptLayout(description);
  if (!accepted.ok) throw new Error('not a layout');
  return accepted.value;
}

const USUAL = layoutOf({});
const add = (result: string, counter: string): Step => ({ do: 'turn', way: 'add', read: { result, counter } });

/** The smoke test of the trade, lowest slide 7, with the carry into wheel 2 missed once, at the second turn. */
const SMOKE: readonly Step[] = [
  { do: 'set', slides: '7' },
  add('7', '1'),
  add('4', '2'),
  add('11', '3'),
  add('18', '4'),
];
const entries = (steps: readonly Step[]): LadderEntry[] => steps.map((step, index) => ({ seq: index + 1, step }));

describe('rows of a run', () => {
  const rows = buildRows(USUAL, entries(SMOKE));

  it('flags the missed carry in its own row and in no later one', () => {
    expect(rows.map(({ faults }) => faults)).toEqual([0, 0, 1, 0, 0]);
    const wheel = rows[2]?.judged?.result[1];
    expect(wheel && carryMark(wheel)).toBe('missed');
  });

  it('says it in the words of the trade', () => {
    expect(rows.map(({ words }) => words)).toEqual(['set 7', 'turn + ×1', 'turn + ×1', 'turn + ×1', 'turn + ×1']);
    const judged = rows[2]?.judged;
    expect(judged && readingSentences(judged)).toEqual([
      'Wheel 2 shows 0, 1 was expected: the carry from wheel 1 was due and was not made.',
    ]);
    expect(judged && shortWords(judged)).toBe('carry into 2 missed');
  });

  it('keeps what should stand there from the first step beside it', () => {
    expect(rows[4]?.judged?.result.slice(0, 2).map(({ expected }) => expected)).toEqual([8, 2]);
  });

  it('draws what follows from a lower wheel as a consequence', () => {
    const long = buildRows(
      USUAL,
      entries([{ do: 'set', slides: '99' }, add('99', '1'), { do: 'set', slides: '1' }, add('90', '2')]),
    );
    expect(long[3]).toMatchObject({ faults: 1, consequences: 1 });
  });

  it('leaves a step that was taken back in sight and out of the judgement', () => {
    const withdrawn = { who: 'Mirrin Tolk', when: '10 Nov 2026', why: 'Turned twice.' };
    const again = buildRows(USUAL, [
      ...entries(SMOKE.slice(0, 2)),
      { seq: 3, step: add('14', '2'), withdrawn },
      { seq: 4, step: add('14', '2') },
    ]);
    expect(again[2]).toMatchObject({ judged: null, withdrawn });
    expect(again[3]?.faults).toBe(0);
  });

  it('grows row by row into the same rows', () => {
    const builder = createRowBuilder(USUAL);
    expect(entries(SMOKE).map((entry) => builder.take(entry))).toEqual(rows);
  });

  it('passes excluded wheels on', () => {
    const left = buildRows(USUAL, entries(SMOKE), { excluded: [{ register: 'result', wheel: 2 }] });
    expect(left[2]).toMatchObject({ faults: 0 });
    expect(left[2]?.judged?.result[1]?.verdict).toBe('excluded');
  });
});
