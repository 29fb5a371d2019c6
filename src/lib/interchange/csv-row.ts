import { acceptSteps, wheelsIn } from '../mechanism/accept';
import type { Layout } from '../mechanism/layout';
import { readGlyphs } from '../mechanism/registers';
import type { ProblemCode } from '../mechanism/result';
import { CLEARABLE, OPERATIONS, type OperationName, REGISTERS, type Step, WAYS } from '../mechanism/steps';
import { type CsvColumn, isCsvColumn, OPERATION_COLUMNS } from './columns';
import { FORMULA_START } from './csv-write';
import { CSV_LIMITS } from './limits';
import { type Moment, readMoment } from './moment';
import type { CsvProblem, CsvProblemCode, CsvRemark, CsvRemarkCode } from './problems';
import type { RunStep } from './run-step';

/** The cells of one row by column name, exactly as they stand in the file; a column that is not there is empty. */
export type CellOf = (column: CsvColumn) => string;

type Detail = { readonly expected?: string; readonly found?: string };

/** Where a field of a step stands in the file, for the fields that are not called as their column. */
const COLUMN_OF: Readonly<Record<string, CsvColumn>> = { to: 'carriage', on: 'reverse', what: 'clear' };

/**
 * Stands in for a cell that has been refused already, so that the rest of the row can still be checked: what any
 * layout accepts.
 */
const HARMLESS = { do: 'reverse', on: false } as const;

/** One row of a file on its way to a step: gathers everything wrong with it, and never stops at the first. */
export class RowReader {
  readonly problems: CsvProblem[] = [];
  readonly remarks: CsvRemark[] = [];

  constructor(
    private readonly line: number,
    private readonly cellOf: CellOf,
    private readonly layout: Layout,
  ) {}

  /** The step that the row says, or null where it has a problem. */
  step(): RunStep | null {
    const name = this.operationName();
    if (name) this.refuseOtherColumns(name);
    const read = this.reading();
    const described = { ...(name ? this.operation(name) : HARMLESS), ...(read && { read }) };
    const step = this.accepted(described);
    const at = this.moment();
    const note = this.note();
    if (!step || this.problems.length > 0) return null;
    return { ...step, ...(at && { at }), ...(note !== '' && { note }) };
  }

  /** The row's own number; null where it has none. */
  number(): number | null {
    if (this.text('step') === '') return null;
    const number = this.whole('step');
    if (number === null || (number >= 1 && Number.isSafeInteger(number))) return number;
    return this.problem('step', 'out-of-range', { expected: '1 or more', found: this.text('step') });
  }

  problem(column: CsvColumn, code: ProblemCode | CsvProblemCode, detail: Detail = {}): null {
    this.problems.push({ line: this.line, column, code, ...detail });
    return null;
  }

  remark(column: CsvColumn, code: CsvRemarkCode, detail: { found?: string; became?: string } = {}): void {
    this.remarks.push({ line: this.line, column, code, ...detail });
  }

  private text(column: CsvColumn): string {
    return this.cellOf(column).trim();
  }

  private operationName(): OperationName | null {
    const said = (name: OperationName): boolean => OPERATION_COLUMNS[name].some((column) => this.text(column) !== '');
    if (this.text('do') !== '') return this.word('do', OPERATIONS);
    const possible = OPERATIONS.filter(said);
    const [only, second] = possible;
    if (!only) return this.problem('do', 'missing', { expected: OPERATIONS.join(', ') });
    if (second) return this.problem('do', 'do-unclear', { expected: 'one operation', found: possible.join(' and ') });
    this.remark('do', 'operation-inferred', { became: only });
    return only;
  }

  /** The operation as described, for the core's own door; what is no word or number is refused here. */
  private operation(name: OperationName): object {
    switch (name) {
      case 'set':
        return { do: name, slides: this.given('slides') ? this.text('slides') : '0' };
      case 'turn': {
        const way = this.word('way', WAYS) ?? 'add';
        return { do: name, way, times: this.text('times') === '' ? 1 : (this.whole('times') ?? 1) };
      }
      case 'shift':
        return { do: name, to: this.given('carriage') ? (this.whole('carriage') ?? 1) : 1 };
      case 'reverse':
        return { do: name, on: this.word('reverse', ['on', 'off']) === 'on' };
      case 'clear':
        return { do: name, what: this.word('clear', CLEARABLE) ?? 'both' };
    }
  }

  /** A row that says two things was done is not understood by leaving one of them out. */
  private refuseOtherColumns(name: OperationName): void {
    for (const other of OPERATIONS)
      for (const column of other === name ? [] : OPERATION_COLUMNS[other])
        if (this.text(column) !== '')
          this.problem(column, 'not-for-this-operation', { expected: `empty for ${name}`, found: this.text(column) });
  }

  private reading(): Step['read'] {
    const read: { result?: string; counter?: string } = {};
    for (const register of REGISTERS) {
      const text = this.text(register);
      if (text === '') continue;
      read[register] = text;
      const glyphs = readGlyphs(text, wheelsIn(this.layout, register));
      if (glyphs.ok && glyphs.value.filled > 0)
        this.remark(register, 'zeros-filled', { found: text, became: String(glyphs.value.filled) });
    }
    return read.result === undefined && read.counter === undefined ? undefined : read;
  }

  /** Through the core's door, whose problems are put at their column. */
  private accepted(described: object): Step | null {
    const steps = acceptSteps(this.layout, [described], []);
    if (steps.ok) return steps.value[0] ?? null;
    for (const { code, path, expected, found } of steps.problems) {
      const field = String(path.at(-1));
      const column = COLUMN_OF[field] ?? (isCsvColumn(field) ? field : 'do');
      this.problem(column, code, {
        ...(expected !== undefined && { expected }),
        ...(found !== undefined && { found }),
      });
    }
    return null;
  }

  private moment(): Moment | null {
    const text = this.text('time');
    if (text === '') return null;
    const moment = readMoment(text);
    if (typeof moment === 'string')
      return this.problem('time', moment, {
        expected: '2026-03-01T09:15:00+01:00',
        found: text,
      });
    if (/\.\d{3}\d*[1-9]/u.test(text))
      this.remark('time', 'time-finer-than-ms', {
        found: text,
        became: moment.instant,
      });
    return moment;
  }

  private note(): string {
    const note = this.cellOf('note');
    const length = [...note].length;
    if (length > CSV_LIMITS.noteLength)
      this.problem('note', 'too-long', {
        expected: String(CSV_LIMITS.noteLength),
        found: String(length),
      });
    if (note.includes('\0')) this.problem('note', 'bad-character', { found: 'U+0000' });
    if (note.startsWith("'") && FORMULA_START.test(note.slice(1))) this.remark('note', 'note-looks-guarded');
    return note;
  }

  private word<T extends string>(column: CsvColumn, choices: readonly T[]): T | null {
    const text = this.text(column);
    const expected = choices.join(', ');
    if (text === '') return this.problem(column, 'missing', { expected });
    const choice = choices.find((each) => each === text.toLowerCase());
    if (!choice) return this.problem(column, 'not-one-of', { expected, found: text });
    if (choice !== text) this.remark(column, 'word-tidied', { found: text, became: choice });
    return choice;
  }

  private given(column: CsvColumn): boolean {
    if (this.text(column) !== '') return true;
    this.problem(column, 'missing');
    return false;
  }

  private whole(column: CsvColumn): number | null {
    const text = this.text(column);
    if (/^\d+$/u.test(text)) return Number(text);
    const exponent = /^[+-]?\d+([.,]\d+)?[eE][+-]?\d+$/u.test(text);
    return this.problem(column, exponent ? 'has-exponent' : 'not-a-whole-number', { found: text });
  }
}
