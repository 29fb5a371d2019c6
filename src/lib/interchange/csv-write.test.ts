import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { acceptLayout, type Layout, SUBTRACTIONS } from '../mechanism/layout';
import { CLEARABLE, type Operation, type Step, WAYS } from '../mechanism/steps';
import { CSV_COLUMNS } from './columns';
import { readRunCsv } from './csv-read';
import { writeRunCsv } from './csv-write';
import { decodeCsv } from './decode';
import { CSV_LIMITS } from './limits';
import type { RunStep } from './run-step';

const HEADER = 'step,do,slides,carriage,way,times,reverse,clear,result,counter,time,note\r\n';

function layoutOf(description: Parameters<typeof acceptLayout>[0]): Layout {
  const layout = acceptLayout(description);
  if (!layout.ok) throw new Error('not a layout');
  return layout.value;
}

const layouts = fc
  .record({
    settingSlides: fc.integer({ min: 1, max: 32 }),
    resultWheels: fc.integer({ min: 1, max: 32 }),
    counterWheels: fc.integer({ min: 0, max: 32 }),
    carriagePositions: fc.integer({ min: 1, max: 32 }),
    subtraction: fc.constantFrom(...SUBTRACTIONS),
  })
  .map(layoutOf);

const digits = (places: number): fc.Arbitrary<string> =>
  fc.array(fc.integer({ min: 0, max: 9 }), { minLength: places, maxLength: places }).map((all) => all.join(''));

const glyphs = (wheels: number): fc.Arbitrary<string> => fc.stringMatching(new RegExp(`^([0-9]~?|\\?){${wheels}}$`));

function operations(layout: Layout): fc.Arbitrary<Operation> {
  return fc.oneof(
    digits(layout.settingSlides).map((slides) => ({ do: 'set' as const, slides })),
    fc.record({
      do: fc.constant('turn' as const),
      way: layout.subtraction === 'none' ? fc.constant('add' as const) : fc.constantFrom(...WAYS),
      times: fc.integer({ min: 1, max: 1_000_000 }),
    }),
    fc.integer({ min: 1, max: layout.carriagePositions }).map((to) => ({ do: 'shift' as const, to })),
    fc.boolean().map((on) => ({ do: 'reverse' as const, on })),
    fc.constantFrom(...CLEARABLE).map((what) => ({ do: 'clear' as const, what })),
  );
}

function readings(layout: Layout): fc.Arbitrary<Step['read']> {
  const result = glyphs(layout.resultWheels);
  const counter = glyphs(layout.counterWheels);
  const some = [fc.constant(undefined), fc.record({ result })];
  return layout.counterWheels === 0
    ? fc.oneof(...some)
    : fc.oneof(...some, fc.record({ counter }), fc.record({ result, counter }));
}

const moments = fc.record({
  instant: fc
    .date({ min: new Date('1900-01-01'), max: new Date('2999-01-01'), noInvalidDate: true })
    .map((date) => date.toISOString()),
  offsetMinutes: fc.integer({ min: -1439, max: 1439 }),
});

/** Notes made to hurt: delimiters, quotes, line breaks, formulas, spaces at the ends, letters of every plane. */
const notes = fc
  .oneof(
    fc.string({ unit: fc.constantFrom(',', ';', '\t', '"', '\r', '\n', "'", '=', '-', '@', ' ', '\uFEFF', 'x') }),
    fc.string({ unit: 'binary' }),
    fc.string({ unit: 'grapheme' }),
  )
  .filter((note) => note !== '' && !note.includes('\0') && [...note].length <= CSV_LIMITS.noteLength);

const runs = layouts.chain((layout) =>
  fc.record({
    layout: fc.constant(layout),
    steps: fc.array(
      fc.tuple(operations(layout), readings(layout), fc.option(moments), fc.option(notes)).map(
        ([operation, read, at, note]): RunStep => ({
          ...operation,
          ...(read && { read }),
          ...(at && { at }),
          ...(note !== null && { note }),
        }),
      ),
      { maxLength: 12 },
    ),
  }),
);

describe('writeRunCsv', () => {
  it('writes the one canonical form', () => {
    const steps: RunStep[] = [
      { do: 'clear', what: 'both', read: { result: '000', counter: '00' } },
      { do: 'set', slides: '07', at: { instant: '2026-03-14T08:12:20.000Z', offsetMinutes: 60 } },
      { do: 'turn', way: 'subtract', read: { result: '?4~3' }, note: 'it said "ah", twice\nand stopped' },
      { do: 'shift', to: 3 },
      { do: 'reverse', on: true },
      { do: 'reverse', on: false, note: ' ' },
    ];
    expect(writeRunCsv(steps)).toBe(
      `${HEADER}1,clear,,,,,,both,000,00,,\r\n2,set,07,,,,,,,,2026-03-14T09:12:20+01:00,\r\n` +
        '3,turn,,,subtract,1,,,?4~3,,,"it said ""ah"", twice\nand stopped"\r\n4,shift,,3,,,,,,,,\r\n' +
        '5,reverse,,,,,on,,,,,\r\n6,reverse,,,,,off,,,,, \r\n',
    );
    expect(writeRunCsv([])).toBe(HEADER);
  });

  it('is read back as the same steps, and written again as the same bytes', () => {
    fc.assert(
      fc.property(runs, ({ layout, steps }) => {
        const text = writeRunCsv(steps);
        const file = readRunCsv(text, layout);
        expect(file.problems).toEqual([]);
        expect(file.dialect).toEqual({ delimiter: ',', newline: 'crlf', bom: false });
        const again = file.rows.map(({ step }) => step);
        expect(again).toEqual(steps);
        expect(writeRunCsv(again)).toBe(text);
      }),
      { numRuns: 1000 },
    );
  });

  it('survives the way through bytes', () => {
    const steps: RunStep[] = [{ do: 'reverse', on: true, note: '\uFEFF× 🛠 “firm”' }];
    const text = writeRunCsv(steps);
    expect(decodeCsv(new TextEncoder().encode(text))).toEqual({ ok: true, value: text });
  });

  it('is the same table to a reader that knows nothing of it', () => {
    fc.assert(
      fc.property(runs, ({ steps }) => {
        const { data, errors } = Papa.parse<string[]>(writeRunCsv(steps), { delimiter: ',', newline: '\r\n' });
        expect(errors).toEqual([]);
        expect(data.at(-1)).toEqual(['']);
        expect(data.slice(1, -1).map((row) => row[11])).toEqual(steps.map(({ note }) => note ?? ''));
        expect(data.slice(0, -1).every((row) => row.length === CSV_COLUMNS.length)).toBe(true);
      }),
      { numRuns: 200 },
    );
  });

  it('guards formulas only when asked, and only by an apostrophe', () => {
    const starts = ['=1+1', '+1', '-1', '@x', '\tx', '\rx', '\nx', '＝1'];
    const steps = starts.map((note): RunStep => ({ do: 'reverse', on: true, note }));
    const layout = layoutOf({});
    const notesOf = (text: string): (string | undefined)[] =>
      readRunCsv(text, layout).rows.map(({ step }) => step.note);
    expect(notesOf(writeRunCsv(steps))).toEqual(starts);
    const guarded = readRunCsv(writeRunCsv(steps, { guardFormulas: true }), layout);
    expect(guarded.rows.map(({ step }) => step.note)).toEqual(starts.map((note) => `'${note}`));
    expect(guarded.rows.map(({ remarks }) => remarks[0]?.code)).toEqual(starts.map(() => 'note-looks-guarded'));
    const harmless: RunStep[] = [{ do: 'reverse', on: true, note: "'twas 1=1 - fine" }];
    expect(writeRunCsv(harmless, { guardFormulas: true })).toBe(writeRunCsv(harmless));
    expect(readRunCsv(writeRunCsv(harmless), layout).rows[0]?.remarks).toEqual([]);
  });
});
