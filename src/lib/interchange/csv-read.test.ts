import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { acceptLayout, type Layout, type LayoutDescription } from '../mechanism/layout';
import { CSV_COLUMNS } from './columns';
import { type RunFile, readRunCsv } from './csv-read';
import { CSV_LIMITS } from './limits';

function layoutOf(description: LayoutDescription = {}): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error('not a layout');
  return layout.value;
}

const usual = layoutOf();
const read = (text: string, layout = usual): RunFile => readRunCsv(text, layout);
const problemsOf = (text: string, layout = usual): string[] =>
  read(text, layout).problems.map(({ line, column, code }) => `${line} ${column} ${code}`);
const remarksOf = (text: string): string[] => {
  const { remarks, rows } = read(text);
  return [...remarks, ...rows.flatMap((row) => row.remarks)].map(
    ({ line, column, code }) => `${line} ${column} ${code}`,
  );
};

describe('the header', () => {
  it('takes columns in any order and leaves any out', () => {
    expect(read('result,do,way\r\n7,turn,add\r\n').rows[0]?.step).toEqual({
      do: 'turn',
      way: 'add',
      times: 1,
      read: { result: '00000000007' },
    });
    expect(read('way\r\nsubtract\r\n').rows[0]?.step).toEqual({ do: 'turn', way: 'subtract', times: 1 });
  });

  it('takes names whatever their case and spaces, and says so', () => {
    expect(remarksOf('do, Way ,NOTE\r\nturn,add,x\r\n')).toEqual(['1 way header-tidied', '1 note header-tidied']);
  });

  it('names every unknown, unnamed and repeated column, and reads the rows all the same', () => {
    const text = 'do,way,force,,do\r\nturn,up,,,\r\n';
    expect(problemsOf(text)).toEqual([
      '1 force unknown-column',
      '1 (column 4) unknown-column',
      '1 do repeated-column',
      '2 way not-one-of',
    ]);
    expect(read(text).problems[0]?.expected).toBe(CSV_COLUMNS.join(', '));
  });

  it('needs a column that says what was done', () => {
    expect(problemsOf('step,result\r\n')).toEqual(['1 do no-operation-column']);
    expect(problemsOf('')).toEqual(['1 null empty-file']);
    expect(problemsOf('\r\ndo\r\n')).toEqual(['1 null empty-file']);
    expect(problemsOf('do,"note\r\nturn')).toEqual(['1 null quote-not-closed']);
    expect(remarksOf('do\r\n')).toEqual(['null null no-rows']);
  });
});

describe('what was done', () => {
  const header = 'do,slides,carriage,way,times,reverse,clear\r\n';

  it('is inferred only where nothing else fits', () => {
    const text = `${header},305,,,,,\r\n,,2,,,,\r\n,,,add,3,,\r\n,,,,,on,\r\n,,,,,,both\r\n`;
    expect(problemsOf(text)).toEqual([]);
    expect(read(text).rows.map(({ understood }) => understood)).toEqual([
      'slides set to 00000305; nothing read',
      'carriage to position 2; nothing read',
      '3 turns adding; nothing read',
      'reversing lever on; nothing read',
      'result and counter cleared; nothing read',
    ]);
    expect(remarksOf(text)).toEqual([2, 3, 4, 5, 6].map((line) => `${line} do operation-inferred`));
    expect(problemsOf('do,slides,way,result\r\n,3,add,\r\n,,,7\r\n')).toEqual(['2 do do-unclear', '3 do missing']);
    expect(problemsOf(`${header},,,,3,,\r\n`)).toEqual(['2 way missing']);
  });

  it('is not understood by leaving cells out', () => {
    expect(problemsOf(`${header}set,305,2,add,,,both\r\n`)).toEqual([
      '2 way not-for-this-operation',
      '2 carriage not-for-this-operation',
      '2 clear not-for-this-operation',
    ]);
  });

  it.each([
    ['set,,,,,,', 'slides missing'],
    ['set,123456789,,,,,', 'slides digit-beyond-slides'],
    ['set,-3,,,,,', 'slides has-sign'],
    ['set,3.5,,,,,', 'slides has-decimal-point'],
    ['set,"3,5",,,,,', 'slides has-decimal-point'],
    ['set,1.2E+07,,,,,', 'slides has-exponent'],
    ['set,3?,,,,,', 'slides bad-glyph'],
    ['shift,,,,,,', 'carriage missing'],
    ['shift,,0,,,,', 'carriage out-of-range'],
    ['shift,,7,,,,', 'carriage out-of-range'],
    ['shift,,two,,,,', 'carriage not-a-whole-number'],
    ['turn,,,,1,,', 'way missing'],
    ['turn,,,both,1,,', 'way not-one-of'],
    ['turn,,,add,0,,', 'times out-of-range'],
    ['turn,,,add,1000001,,', 'times out-of-range'],
    ['turn,,,add,1E+06,,', 'times has-exponent'],
    ['turn,,,add,1.0,,', 'times not-a-whole-number'],
    ['turn,,,add,99999999999999999999,,', 'times not-a-whole-number'],
    ['reverse,,,,,yes,', 'reverse not-one-of'],
    ['reverse,,,,,,', 'reverse missing'],
    ['clear,,,,,,', 'clear missing'],
    ['clear,,,,,,slides', 'clear not-one-of'],
    ['crank,,,,,,', 'do not-one-of'],
  ])('refuses %s', (row, problem) => {
    expect(problemsOf(`${header}${row}\r\n`)).toEqual([`2 ${problem}`]);
  });

  it('holds to the layout', () => {
    const none = layoutOf({ subtraction: 'none', counterWheels: 0, carriagePositions: 1, settingSlides: 32 });
    const text = 'do,slides,carriage,way,counter\r\nturn,,,subtract,\r\nshift,,2,,\r\nturn,,,add,0\r\n';
    expect(problemsOf(text, none)).toEqual([
      '2 way not-in-layout',
      '3 carriage out-of-range',
      '4 counter too-many-glyphs',
    ]);
    const slides = '9'.repeat(32);
    expect(read(`do,slides\r\nset,${slides}\r\n`, none).rows[0]?.step).toEqual({ do: 'set', slides });
  });

  it('reads words in any case, and says so', () => {
    expect(remarksOf('do,way\r\nTurn,ADD\r\n')).toEqual(['2 do word-tidied', '2 way word-tidied']);
  });
});

describe('readings', () => {
  it.each([
    ['00000000007', '00000000007'],
    ['0000_0000_4~7', '0000000004~7'],
    ['000 000 00 4~?7', '000000004~?7'],
    ['7', '00000000007'],
    ['', undefined],
    ['0'.repeat(12), 'too-many-glyphs'],
    ['-7', 'has-sign'],
    ['7.0', 'has-decimal-point'],
    ['"7,0"', 'has-decimal-point'],
    ['1.23457E+10', 'has-exponent'],
    ['"1,23457e+10"', 'has-exponent'],
    ['O7', 'bad-glyph'],
    ['~7', 'bad-glyph'],
    ['_', 'missing'],
  ])('of %s', (cell, outcome) => {
    const file = read(`do,way,result\r\nturn,add,${cell}\r\n`);
    const answer = file.problems[0]?.code ?? file.rows[0]?.step.read?.result;
    expect(answer).toBe(outcome);
  });

  it('says how many wheels it filled', () => {
    const row = read('do,way,result,counter\r\nturn,add,14,000002\r\n').rows[0];
    expect(row?.remarks).toEqual([{ line: 2, column: 'result', code: 'zeros-filled', found: '14', became: '9' }]);
  });
});

describe('order, times and notes', () => {
  it('wants rising step numbers, and points at gaps', () => {
    const rows = (numbers: readonly string[]): string =>
      `step,do,reverse\r\n${numbers.map((n) => `${n},reverse,on\r\n`).join('')}`;
    expect(problemsOf(rows(['1', '2', '2', '1', '3', '0', 'x', '-1', '4']))).toEqual([
      '4 step step-repeated',
      '5 step step-falling',
      '7 step out-of-range',
      '8 step not-a-whole-number',
      '9 step not-a-whole-number',
    ]);
    expect(problemsOf(rows(['', '', '3', '']))).toEqual([]);
    expect(problemsOf(rows(['', '', '2']))).toEqual(['4 step step-repeated']);
    expect(remarksOf(rows(['1', '2', '4', '', '6', '8']))).toEqual(['4 step step-gap', '7 step step-gap']);
  });

  it('reads times exactly, and says when they go back', () => {
    const row = (time: string): string => `reverse,on,${time}\r\n`;
    const times = ['2026-03-14T09:12:00+01:00', '2026-03-14T08:11:00Z', '2026-03-14T08:12:00.1234Z', ''];
    const text = `do,reverse,time\r\n${times.map(row).join('')}`;
    expect(remarksOf(text)).toEqual(['3 time time-goes-back', '4 time time-finer-than-ms']);
    expect(read(text).rows.map(({ step }) => step.at)).toEqual([
      { instant: '2026-03-14T08:12:00.000Z', offsetMinutes: 60 },
      { instant: '2026-03-14T08:11:00.000Z', offsetMinutes: 0 },
      { instant: '2026-03-14T08:12:00.123Z', offsetMinutes: 0, written: '2026-03-14T08:12:00.1234Z' },
      undefined,
    ]);
    expect(problemsOf(`do,reverse,time\r\n${row('2026-02-30T09:12:00Z')}${row('2026-03-14T09:12:00')}`)).toEqual([
      '2 time bad-time',
      '3 time time-without-offset',
    ]);
  });

  it('keeps notes as they are, within a length', () => {
    const text = (note: string): string => `do,reverse,note\r\nreverse,on,${note}\r\n`;
    expect(read(text(' "5" pin  ')).rows[0]?.step.note).toBe(' "5" pin  ');
    expect(problemsOf(text('🛠'.repeat(CSV_LIMITS.noteLength)))).toEqual([]);
    expect(problemsOf(text('x'.repeat(CSV_LIMITS.noteLength + 1)))).toEqual(['2 note too-long']);
    expect(problemsOf(text('a\0b'))).toEqual(['2 note bad-character']);
  });

  it('skips empty rows and says so, but not the end of the file', () => {
    expect(remarksOf('do,reverse\r\n\r\nreverse,on\r\n,\r\nreverse,off\r\n')).toEqual([
      '2 null blank-row',
      '4 null blank-row',
    ]);
    expect(read('do,reverse\r\n\r\n,\r\n  \r\nreverse,off\r\n').remarks).toEqual([
      { line: 2, column: null, code: 'blank-row', found: '3' },
    ]);
  });

  it('takes as many rows as the limit and not one more', () => {
    const rows = (count: number): string => `do,reverse\n${'reverse,on\n'.repeat(count)}`;
    expect(read(rows(CSV_LIMITS.rows)).rows).toHaveLength(CSV_LIMITS.rows);
    expect(problemsOf(rows(CSV_LIMITS.rows + 5))).toEqual([`${CSV_LIMITS.rows + 2} null too-many`]);
  });

  it('stops listing problems at a limit, and says so', () => {
    const file = read(`do,reverse\n${'reverse,yes\n'.repeat(CSV_LIMITS.problems + 50)}`);
    expect(file.problems).toHaveLength(CSV_LIMITS.problems + 1);
    expect(file.problems.at(-1)).toMatchObject({ line: CSV_LIMITS.problems + 2, code: 'more-problems' });
    const wide = read(`${'x,'.repeat(5000)}do\n`);
    expect(wide.problems).toHaveLength(CSV_LIMITS.problems + 1);
    expect(read(`do,reverse\n${'reverse,yes\n'.repeat(CSV_LIMITS.problems)}`).problems).toHaveLength(
      CSV_LIMITS.problems,
    );
  });

  it('answers the worst files of the largest size in little time', () => {
    const fill = (start: string, piece: string): string => start + piece.repeat(CSV_LIMITS.bytes / piece.length);
    const worst = [
      fill('do,note\r\n', '"a"x",b\r\n'),
      fill('do,note\r\n', '"a"x,'),
      fill('do,note\r\n"', 'a\r\n'),
      fill('do,note\n', 'x,"\n"\n'),
      fill('do,note\n"', '""'),
      fill('do\n', '\n'),
      fill('do,reverse\n', '\nreverse,on\n'),
      fill('', 'x,'),
      fill('', '"'),
    ];
    const from = performance.now();
    for (const { problems, remarks } of worst.map((text) => read(text)))
      expect(problems.length + remarks.length).toBeGreaterThan(0);
    // A few seconds; a quadratic step anywhere takes minutes, so that a slow machine cannot fail this by itself.
    expect(performance.now() - from).toBeLessThan(30_000);
  }, 60_000);

  it('finds a row with too few or too many fields', () => {
    expect(problemsOf('do,reverse\r\nreverse\r\nreverse,on,x\r\n')).toEqual([
      '2 null field-count',
      '3 null field-count',
    ]);
  });
});

describe('any text', () => {
  it('is answered, never thrown at, and every place named is in the file', () => {
    const piece = fc.oneof(
      fc.constantFrom(
        ...CSV_COLUMNS,
        'turn',
        'add',
        'set',
        '7',
        '1.2E+9',
        '"',
        ',',
        ';',
        '\t',
        '\r\n',
        '\n',
        ' ',
        '\uFEFF',
      ),
      fc.string({ unit: 'binary', maxLength: 4 }),
    );
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 60 }), (pieces) => {
        const text = pieces.join('');
        const last = text.split(/\r\n|\n|\r/).length;
        const file = read(text);
        const lines = [...file.problems, ...file.remarks, ...file.rows].map(({ line }) => line);
        for (const line of lines) expect(line === null || (line >= 1 && line <= last)).toBe(true);
      }),
      { numRuns: 3000 },
    );
  });
});
