import type { ReactElement } from 'react';
import type { LadderWheel } from '@/lib/comparison/compare';
import { WheelCell } from './WheelCell';

const PLAIN: LadderWheel = {
  wheel: 2,
  read: '4',
  expected: 4,
  expectedFromLast: 4,
  verdict: 'agrees',
  stepsOff: 0,
  carryDue: false,
  carryMade: false,
  follows: false,
};
const DIFFERS = { ...PLAIN, read: '3', verdict: 'differs', stepsOff: -1 } as const;

const CELLS: readonly { readonly wheel: LadderWheel; readonly words: string }[] = [
  { wheel: DIFFERS, words: 'differs, expected above' },
  { wheel: { ...DIFFERS, follows: true }, words: 'differs only by what lies below' },
  { wheel: { ...PLAIN, read: '4~', verdict: 'between', expectedFromLast: null }, words: 'between two numerals' },
  { wheel: { ...PLAIN, read: '?', verdict: 'unread' }, words: 'not read' },
  { wheel: { ...PLAIN, verdict: 'excluded' }, words: 'left out' },
  { wheel: { ...PLAIN, carryDue: true, carryMade: true }, words: 'carry made' },
  { wheel: { ...PLAIN, carryDue: true }, words: 'carry missed' },
  { wheel: { ...PLAIN, carryMade: true }, words: 'carry nobody asked for' },
];

const KEYS: readonly { readonly keys: readonly string[]; readonly words: string }[] = [
  { keys: ['↑', '↓'], words: 'row by row' },
  { keys: ['Home', 'End'], words: 'first and last row' },
  { keys: ['N', 'P'], words: 'next and previous fault' },
  { keys: ['Enter'], words: 'open the row' },
  { keys: ['Esc'], words: 'close it' },
];

/** What the marks mean, drawn with the very cells of the ladder, and which keys move in it. */
export function Legend({ open = false }: { open?: boolean }): ReactElement {
  return (
    <details className="legend border-t border-rule print:hidden" open={open}>
      <summary className="flex min-h-11 items-center gap-2 px-4 text-sm text-ink-soft hover:bg-verdigris-wash">
        <svg className="size-2.5" viewBox="0 0 10 10" aria-hidden="true">
          <path d="M1 3l4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </svg>
        Marks and keys
      </summary>
      <div className="grid gap-4 px-4 pt-1 pb-4 text-sm">
        <ul className="grid gap-x-6 gap-y-1 grid-cols-[repeat(auto-fill,minmax(min(15rem,100%),1fr))]">
          {CELLS.map(({ wheel, words }) => (
            <li key={words} className="flex items-center gap-3">
              <table className="legend-cell" aria-hidden="true">
                <tbody>
                  <tr>
                    <WheelCell register="result" wheel={wheel} third={false} />
                  </tr>
                </tbody>
              </table>
              <span>{words}</span>
            </li>
          ))}
        </ul>
        <ul className="flex flex-wrap gap-x-6 gap-y-2">
          {KEYS.map(({ keys, words }) => (
            <li key={words} className="flex items-center gap-1.5">
              {keys.map((key) => (
                <kbd key={key} className="border border-rule-firm px-1.5 text-xs leading-5">
                  {key}
                </kbd>
              ))}
              <span className="text-ink-soft">{words}</span>
            </li>
          ))}
        </ul>
      </div>
    </details>
  );
}
