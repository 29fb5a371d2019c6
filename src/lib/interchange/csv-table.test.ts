import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readTable } from './csv-table';

const cellsOf = (text: string): readonly (readonly string[])[] => readTable(text).records.map(({ cells }) => cells);
const linesOf = (text: string): number[] => readTable(text).records.map(({ line }) => line);

describe('readTable', () => {
  // One case for each rule of RFC 4180, section 2, and for what its readers are known to disagree on.
  it.each<[string, string, string[][]]>([
    [
      'plain fields',
      'a,b\r\n1,2\r\n',
      [
        ['a', 'b'],
        ['1', '2'],
      ],
    ],
    [
      'no line end after the last record',
      'a,b\r\n1,2',
      [
        ['a', 'b'],
        ['1', '2'],
      ],
    ],
    [
      'a comma in quotes',
      'a,b\r\n"1,5",2\r\n',
      [
        ['a', 'b'],
        ['1,5', '2'],
      ],
    ],
    [
      'a doubled quote',
      'a,b\r\n"say ""ah""",2\r\n',
      [
        ['a', 'b'],
        ['say "ah"', '2'],
      ],
    ],
    [
      'nothing but a quote',
      'a,b\r\n"""",2\r\n',
      [
        ['a', 'b'],
        ['"', '2'],
      ],
    ],
    [
      'a line break in quotes',
      'a,b\r\n"one\r\ntwo",2\r\n',
      [
        ['a', 'b'],
        ['one\r\ntwo', '2'],
      ],
    ],
    [
      'another line break in quotes',
      'a,b\r\n"one\ntwo","\r"\r\n',
      [
        ['a', 'b'],
        ['one\ntwo', '\r'],
      ],
    ],
    [
      'empty fields',
      'a,b,c\r\n,"",\r\n',
      [
        ['a', 'b', 'c'],
        ['', '', ''],
      ],
    ],
    [
      'spaces are data',
      'a,b\r\n 1 ,  \r\n',
      [
        ['a', 'b'],
        [' 1 ', '  '],
      ],
    ],
    [
      'quotes around every field',
      '"a","b"\r\n"1","2"\r\n',
      [
        ['a', 'b'],
        ['1', '2'],
      ],
    ],
    [
      'a quote inside an unquoted field',
      'a,b\r\n5" pin,2\r\n',
      [
        ['a', 'b'],
        ['5" pin', '2'],
      ],
    ],
    [
      'letters beyond ASCII',
      'a,b\r\nʤ,"×, 🛠"\r\n',
      [
        ['a', 'b'],
        ['ʤ', '×, 🛠'],
      ],
    ],
    [
      'braces and quotes of another notation',
      'a,b\r\n"{""x"": 0}",2\r\n',
      [
        ['a', 'b'],
        ['{"x": 0}', '2'],
      ],
    ],
  ])('%s', (_, text, cells) => {
    expect(cellsOf(text)).toEqual(cells);
    // With LF between the records, the same records (a quoted CRLF stays what it was).
    if (!text.includes('\r\ntwo')) expect(cellsOf(text.replaceAll('\r\n', '\n'))).toEqual(cells);
  });

  it.each([
    ['step,do\r\n1,turn\r\n', { delimiter: ',', newline: 'crlf', bom: false }],
    ['\uFEFFstep;do\r\n', { delimiter: ';', newline: 'crlf', bom: true }],
    ['step\tdo\n1\tturn', { delimiter: '\t', newline: 'lf', bom: false }],
    ['step,do\r1,turn\r', { delimiter: ',', newline: 'cr', bom: false }],
    ['step,do\r\n1,turn\n2,turn', { delimiter: ',', newline: 'mixed', bom: false }],
    ['do', { delimiter: ',', newline: 'none', bom: false }],
    ['"step";"my, own, notes, here";"do"\n', { delimiter: ';', newline: 'lf', bom: false }],
    ['when;who;what\n', { delimiter: ';', newline: 'lf', bom: false }],
    ['step,note\r\n1,"a\nb"\r\n', { delimiter: ',', newline: 'crlf', bom: false }],
  ])('tells how %j is written', (text, dialect) => {
    expect(readTable(text).dialect).toEqual(dialect);
  });

  it('takes the CR of mixed line ends for no data, quoted or not', () => {
    expect(cellsOf('do,note\n1,x\r\n2,"x"\r\n3,"x\r"\r\n4,"""\r"\r\n5,6"\r\n')).toEqual([
      ['do', 'note'],
      ['1', 'x'],
      ['2', 'x'],
      ['3', 'x\r'],
      ['4', '"\r'],
      ['5', '6"'],
    ]);
  });

  it('counts physical lines through quoted line breaks, whatever the line ends', () => {
    const text = 'do,note\r\n1,"a\r\nb\r\n"\r\n2,x\r\n\r\n3,"c\nd"\r\n4,y';
    expect(linesOf(text)).toEqual([1, 2, 5, 6, 7, 9]);
    expect(linesOf(text.replaceAll('\r\n', '\n'))).toEqual([1, 2, 5, 6, 7, 9]);
    expect(linesOf('do,note\r1,x\r2,"a\rb"\r3,y')).toEqual([1, 2, 3, 5]);
  });

  it('says where quotes are broken', () => {
    const open = readTable('do,note\r\n1,"a\r\nb"\r\n2,"c\r\n3,d\r\n').records;
    expect(open.at(-1)).toMatchObject({ line: 4, broken: { code: 'quote-not-closed', line: 4 } });
    expect(open.slice(0, -1).every(({ broken }) => broken === undefined)).toBe(true);
    const late = readTable('do,note,x\r\n1,"a\r\nb","c"d"\r\n2,e,f\r\n').records;
    expect(late[1]).toMatchObject({ line: 2, broken: { code: 'quote-misplaced', line: 3 } });
  });

  it('reads back any table, however it is quoted, and finds the line of each record', () => {
    const cell = fc.string({ unit: fc.constantFrom('a', '7', ' ', '"', ',', ';', '\t', '\r', '\n', "'", 'é') });
    const table = fc
      .integer({ min: 2, max: 4 })
      .chain((width) => fc.array(fc.array(cell, { minLength: width, maxLength: width }), { maxLength: 6 }));
    const dialects = fc.record({ delimiter: fc.constantFrom(',', ';', '\t'), end: fc.constantFrom('\r\n', '\n') });
    fc.assert(
      fc.property(table, dialects, fc.boolean(), (rows, { delimiter, end }, always) => {
        const quote = (text: string): string =>
          always || /[",;\t\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
        const all = [['step', 'do', 'note', 'time'].slice(0, rows[0]?.length ?? 2), ...rows];
        const written = all.map((row) => row.map(quote).join(delimiter) + end);
        const { records } = readTable(written.join(''));
        expect(records.map(({ cells }) => cells)).toEqual(all);
        let line = 1;
        records.forEach((record, i) => {
          expect(record.line).toBe(line);
          line += (written[i]?.match(/\n/g) ?? []).length;
        });
      }),
      { numRuns: 1000 },
    );
  });
});
