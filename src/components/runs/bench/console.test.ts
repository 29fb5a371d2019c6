import { describe, expect, it } from 'vitest';
import { acceptLayout, type LayoutDescription } from '@/lib/mechanism/layout';
import type { Step } from '@/lib/mechanism/steps';
import { command, type Entry, enter, FRESH, type Ground, leave, type Outcome, typeIn } from './console';

function ground(description: LayoutDescription = {}): Ground {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error('not a layout');
  return { layout: layout.value, reversed: false };
}

/** Types a text key by key, as a keyboard does; ⏎ is Enter. Gathers what was logged. */
function keys(typed: string, on: Ground = ground(), from: Entry = FRESH): Outcome & { steps: Step[] } {
  let outcome: Outcome = { entry: from };
  const steps: Step[] = [];
  for (const key of typed) {
    const { entry } = outcome;
    outcome = key === '⏎' ? enter(entry, on) : typeIn(entry, entry.text + key, on);
    if (outcome.step) steps.push(outcome.step);
  }
  return { ...outcome, steps };
}
const turn = (result: string, counter?: string): Step => ({
  do: 'turn',
  way: 'add',
  times: 1,
  read: { result: result.padStart(11, '0'), ...(counter !== undefined && { counter: counter.padStart(6, '0') }) },
});

describe('the entry line', () => {
  it('logs the smoke test by keys alone', () => {
    const { steps } = keys(`s7⏎${[1, 2, 3, 4, 5, 6, 7, 8, 9].map((n) => `${7 * n} ${n}⏎`).join('')}`);
    expect(steps).toEqual([
      { do: 'set', slides: '00000007' },
      ...[7, 14, 21, 28, 35, 42, 49, 56, 63].map((result, index) => turn(`${result}`, `${index + 1}`)),
    ]);
  });

  it.each(['14 2⏎', '14/2⏎', '14⏎2⏎', ' 14  2 ⏎', '14 /2⏎', '14 ⏎2⏎'])('takes %s as both registers', (typed) => {
    expect(keys(typed).steps).toEqual([turn('14', '2')]);
  });

  it('leaves a register unread only when asked twice', () => {
    expect(keys('14⏎').steps).toEqual([]);
    expect(keys('14⏎').entry).toMatchObject({ text: '14/', wrong: false });
    expect(keys('14⏎⏎').steps).toEqual([turn('14')]);
    expect(keys('/2⏎').steps).toEqual([{ do: 'turn', way: 'add', times: 1, read: { counter: '000002' } }]);
    expect(keys('14⏎', ground({ counterWheels: 0 })).steps).toEqual([turn('14')]);
  });

  it('logs nothing for an empty line, and a turn without reading only when told to', () => {
    expect(keys('⏎')).toMatchObject({ steps: [], entry: { wrong: true } });
    expect(keys('o').steps).toEqual([{ do: 'turn', way: 'add', times: 1 }]);
  });

  it('takes wheels between numerals and unread ones', () => {
    expect(keys('4~? 1⏎').steps).toEqual([
      { do: 'turn', way: 'add', times: 1, read: { result: '0000000004~?', counter: '000001' } },
    ]);
  });

  it('says what is wrong, and keeps what was typed', () => {
    for (const typed of ['123456789012 1⏎', '1.5 1⏎', '1 2 3⏎', '1/2/3⏎', '7 1234567⏎']) {
      const { steps, entry } = keys(typed);
      expect(steps).toEqual([]);
      expect(entry).toMatchObject({ wrong: true, text: typed.slice(0, -1) });
      expect(entry.said).not.toBe('');
    }
    const pasted = typeIn(FRESH, '1.23457E+14', ground(), true);
    expect(pasted.entry.text).toBe('1.23457E+14');
    expect(enter(pasted.entry, ground()).entry.said).toContain('spreadsheet');
  });

  it('goes on with the way and the number of turns of the last one', () => {
    const { steps, entry } = keys('-x12⏎5 1⏎');
    expect(steps).toMatchObject([{ way: 'subtract', times: 12 }]);
    expect(entry).toMatchObject({ way: 'subtract', times: 12, text: '', asking: 'reading' });
    expect(keys('+*1⏎', ground(), entry).entry).toMatchObject({ way: 'add', times: 1 });
    expect(keys('x0⏎').entry.wrong).toBe(true);
    expect(keys('x1000001⏎').entry.wrong).toBe(true);
  });

  it('does every other operation by key', () => {
    expect(keys('c3⏎').steps).toEqual([{ do: 'shift', to: 3 }]);
    expect(keys('c7⏎')).toMatchObject({ steps: [], entry: { wrong: true } });
    expect(keys('r').steps).toEqual([{ do: 'reverse', on: true }]);
    expect(keys('r', { ...ground(), reversed: true }).steps).toEqual([{ do: 'reverse', on: false }]);
    expect(keys('z⏎').steps).toEqual([{ do: 'clear', what: 'both' }]);
    expect(keys('zr').steps).toEqual([{ do: 'clear', what: 'result' }]);
    expect(keys('zc').steps).toEqual([{ do: 'clear', what: 'counter' }]);
    expect(keys('u').deed).toBe('take-back');
    expect(keys('S305⏎').steps).toEqual([{ do: 'set', slides: '00000305' }]);
  });

  it('does not subtract on a machine that cannot', () => {
    expect(keys('-', ground({ subtraction: 'none' })).entry).toMatchObject({ way: 'add', wrong: true });
  });

  it('gives a note to the next step only', () => {
    const first = keys('n stiff at the end, s and c free⏎7 1⏎');
    expect(first.note).toBe('stiff at the end, s and c free');
    expect(keys('14 2⏎', ground(), first.entry).note).toBe('');
  });

  it('keeps a reading half typed when its operation is changed, and Escape empties the line', () => {
    expect(keys('14-').entry).toMatchObject({ text: '14', way: 'subtract' });
    expect(leave(keys('s12').entry).entry).toMatchObject({ asking: 'reading', text: '' });
    expect(command(keys('14').entry, 'keys', ground())).toMatchObject({ deed: 'keys', entry: { text: '14' } });
  });
});
