import { describe, expect, it } from 'vitest';
import type { RunEntry } from '@/lib/schemas/run-shapes';
import { keptOf, packEntries, unpackEntries } from './pack';

const plain = {
  note: '',
  at: null,
  by: 'A. Tester',
  readingId: null,
  corrections: [],
  withdrawn: null,
} as const;
const id = '01940000-0000-7000-8000-000000000001';
const ENTRIES: RunEntry[] = [
  {
    ...plain,
    seq: 1,
    id,
    step: { do: 'clear', what: 'counter' },
    corrections: [],
  },
  {
    ...plain,
    seq: 2,
    id,
    step: { do: 'set', slides: '00000007' },
    note: 'a "note"\nof two lines',
    corrections: [],
  },
  {
    ...plain,
    seq: 3,
    id,
    step: {
      do: 'turn',
      way: 'subtract',
      times: 12,
      read: { result: '0000000004~?', counter: '000001' },
    },
    at: { instant: '2026-03-14T08:12:00.250Z', offsetMinutes: -210 },
    readingId: id,
    corrections: [
      {
        was: { counter: '000002' },
        who: 'B',
        when: '2026-03-14T08:13:00.000Z',
        why: 'misread',
      },
    ],
  },
  { ...plain, seq: 4, id, step: { do: 'shift', to: 12 }, corrections: [] },
  {
    ...plain,
    seq: 5,
    id,
    step: { do: 'reverse', on: true, read: { result: '?' } },
    at: { instant: '1970-01-01T00:00:00.000Z', offsetMinutes: 0 },
    corrections: [],
    withdrawn: { who: 'B', when: '2026-03-14T08:13:00.000Z', why: 'not done' },
  },
  {
    ...plain,
    seq: 6,
    id,
    step: { do: 'turn', way: 'add', times: 1 },
    corrections: [],
  },
];

describe('a run packed for its page', () => {
  it('comes out as it went in', () => {
    expect(unpackEntries(packEntries(ENTRIES))).toEqual(ENTRIES.map(keptOf));
  });

  it('takes about a hundred bytes a step, and keeps the ids of the latest only', () => {
    const many = Array.from({ length: 10_000 }, (_, index): RunEntry => {
      const step = {
        do: 'turn',
        way: 'add',
        times: 1,
        read: { result: '00000000007', counter: '000001' },
      } as const;
      const at = { instant: '2026-03-14T08:12:00.000Z', offsetMinutes: 60 };
      return {
        ...plain,
        seq: index + 1,
        id,
        step,
        at,
        readingId: id,
        corrections: [],
      };
    });
    const packed = packEntries(many);
    expect(packed.length).toBeLessThan(1_200_000);
    expect(unpackEntries(packed).filter((kept) => kept.id !== null)).toHaveLength(500);
  });
});
