import type { CsvProblem, CsvProblemCode, CsvRemark, CsvRemarkCode } from '../interchange/problems';
import type { Problem, ProblemCode } from '../mechanism/result';

/** A problem as people read it: where, what is wrong (with what was expected and found), and what to do about it. */
export interface Worded {
  readonly place: string;
  readonly what: string;
  readonly cure: string;
}

interface Detail {
  readonly expected?: string | undefined;
  readonly found?: string | undefined;
}

type Sentences = readonly [what: string, cure: string];

const ONE_OF = 'Write it as listed.';
const AS_READ = 'Write the register as it stands in the windows, highest wheel first, digits only.';
const AS_TEXT = 'Format the column as text in the spreadsheet, enter it again, and export again.';

/** The one place where a code becomes words. `Record` makes a code without words a type error. */
const WORDS: Record<ProblemCode | CsvProblemCode, (detail: Detail) => Sentences> = {
  'not-a-whole-number': (d) => [`${q(d.found)} is not a whole number${expecting(d)}.`, 'Write it in digits only.'],
  'out-of-range': (d) => [`${q(d.found)} is out of range${expecting(d)}.`, 'Give a number in that range.'],
  'not-one-of': (d) => [`${q(d.found)} is not known here${expecting(d)}.`, ONE_OF],
  missing: (d) => [`Nothing usable is given here${expecting(d)}${but(d)}.`, 'Fill it in.'],
  'too-many-glyphs': (d) => [
    `There are ${d.found} places here, but the register has ${d.expected} wheels.`,
    'Check the reading, and that the layout chosen is this machine’s.',
  ],
  'bad-glyph': (d) => [
    `${q(d.found)} is not something a wheel can show.`,
    'Use 0 to 9, a digit with ~ for a wheel between two numerals, or ? for one that could not be read.',
  ],
  'has-sign': (d) => [`${q(d.found)} has a sign; a register has none.`, AS_READ],
  'has-decimal-point': (d) => [`${q(d.found)} has a decimal or thousands mark; a register has none.`, AS_READ],
  'has-exponent': (d) => [
    `${q(d.found)} was shortened by a spreadsheet, and the digits left out are lost.`,
    `Take them from the tester’s notes. ${AS_TEXT}`,
  ],
  'digit-beyond-slides': (d) => [
    `There are ${d.found} digits here, but the machine has ${d.expected} setting slides.`,
    'Set fewer digits, or choose the layout of this machine.',
  ],
  'not-in-layout': (d) => [
    `The layout of this machine does not have ${q(d.found)} here${expecting(d)}.`,
    'Take it out, or choose the layout of this machine.',
  ],
  'seed-needed': () => [
    'A fault that acts only sometimes needs a seed, so that the run can be repeated.',
    'Give any whole number as seed.',
  ],
  'too-many': (d) => [`There are more than ${d.expected} here.`, 'Split it, and send or import the parts one by one.'],
  'file-too-large': (d) => [`The file has ${d.found}; at most ${d.expected} are read.`, 'Split it into several files.'],
  'not-utf-8': () => [
    'The file is not in UTF-8, so its characters cannot be told for certain.',
    'Save it as “CSV UTF-8” in the spreadsheet and upload it again.',
  ],
  'utf-16': () => [
    'The file is in UTF-16, which spreadsheets call “Unicode text”.',
    'Save it as “CSV UTF-8” in the spreadsheet and upload it again.',
  ],
  'empty-file': () => [
    'The file does not begin with a row of column names.',
    'Make the first line the column names, such as step,do,slides,way,result,counter.',
  ],
  'unknown-column': (d) => [
    `${d.found ? `No column is called ${q(d.found)}` : 'This column has no name'}. Known columns: ${d.expected}.`,
    'Rename the column or take it out.',
  ],
  'repeated-column': (d) => [`The column ${q(d.found)} is there twice.`, 'Take one of the two out.'],
  'no-operation-column': (d) => [
    `No column says what was done. Known columns: ${d.expected}.`,
    'Add the column do, or check that the first line holds the column names.',
  ],
  'field-count': (d) => [
    `The row has ${d.found} fields, but the header names ${d.expected}.`,
    'Check for a missing or an extra separator, and put quotes around a note that holds one.',
  ],
  'quote-not-closed': (d) => [
    `A quote opens here${inside(d)} and is never closed, so the rest of the file cannot be read.`,
    'Close the quote; inside quotes, write a quote twice.',
  ],
  'quote-misplaced': (d) => [
    `The quotes of a field that begins here${inside(d)} do not end where the field ends.`,
    'Put quotes around the whole field; inside quotes, write a quote twice.',
  ],
  'do-unclear': (d) => [
    `The row does not say what was done, and its cells would allow ${d.found}.`,
    'Fill in the column do, and make two rows of two operations.',
  ],
  'not-for-this-operation': (d) => [
    `${q(d.found)} does not belong to what this row does${expecting(d)}.`,
    'Empty the cell, or make it a row of its own.',
  ],
  'step-repeated': (d) => [`Step ${d.found} is there twice${expecting(d)}.`, 'Take one row out, or number them anew.'],
  'step-falling': (d) => [
    `Step ${d.found} comes after a higher number${expecting(d)}.`,
    'Put the rows in the order in which they were done, or leave the column empty.',
  ],
  'bad-time': (d) => [
    `${q(d.found)} is not a date and time of RFC 3339${suchAs(d)}.`,
    'Write year-month-day, T, the time with seconds, and the offset from UTC; or leave the cell empty.',
  ],
  'time-without-offset': (d) => [
    `${q(d.found)} does not say its offset from UTC${suchAs(d)}.`,
    'Add the offset, such as +01:00, or Z for UTC; or leave the cell empty.',
  ],
  'too-long': (d) => [`The text has ${d.found} characters; at most ${d.expected} are kept.`, 'Shorten it.'],
  'bad-character': (d) => [`The text holds a character that cannot be kept (${d.found}).`, 'Take it out.'],
  'more-problems': (d) => [
    `There are more problems than the ${d.expected} listed; the file was not read to its end.`,
    'Put these right first, then upload the file again.',
  ],
};

const REMARKS: Record<CsvRemarkCode, (detail: { found?: string; became?: string }) => string> = {
  'byte-order-mark': () => 'The file begins with a byte order mark, which was skipped.',
  'lf-line-ends': () => 'Lines end with LF instead of CRLF.',
  'cr-line-ends': () => 'Lines end with CR instead of CRLF.',
  'mixed-line-ends': () => 'Lines end in more than one way.',
  semicolons: () => 'Fields are separated by semicolons.',
  tabs: () => 'Fields are separated by tabs.',
  'header-tidied': (d) => `The column name ${q(d.found)} was read as ${d.became}.`,
  'no-rows': () => 'The file holds column names only, no steps.',
  'blank-row': (d) => (d.found === '1' ? 'An empty row was skipped.' : `${d.found} empty rows were skipped.`),
  'operation-inferred': (d) => `The column do is empty; only ${d.became} fits the other cells.`,
  'word-tidied': (d) => `${q(d.found)} was read as ${d.became}.`,
  'zeros-filled': (d) => `${q(d.found)} is shorter than the register: ${places(d.became)} on the left taken as zero.`,
  'step-gap': (d) => `Step ${d.found} follows ${d.became}: a row may be missing. Steps are numbered by their order.`,
  'time-goes-back': () => 'The time is earlier than in a row above.',
  'time-finer-than-ms': () => 'The time is finer than a millisecond; the rest is cut off.',
  'note-looks-guarded': () =>
    'The note begins with an apostrophe that may have come from a spreadsheet-safe export; it was kept.',
};

/** A problem of the core or of a file in plain words. */
export function wordsOf(problem: Problem | CsvProblem): Worded {
  const [what, cure] = WORDS[problem.code](problem);
  return {
    place: 'path' in problem ? pathInWords(problem.path) : lineInWords(problem),
    what,
    cure,
  };
}

/** What is wrong and its cure in one text, for the `detail` of a problem document whose pointer tells the place. */
export function detailOf(problem: Problem | CsvProblem): string {
  const { what, cure } = wordsOf(problem);
  return `${what} ${cure}`;
}

/** A remark on a file in plain words, with its place as `wordsOf` gives it. */
export function remarkInWords(remark: CsvRemark): {
  readonly place: string;
  readonly what: string;
} {
  return { place: lineInWords(remark), what: REMARKS[remark.code](remark) };
}

/** `['steps', 3, 'slides']` → `step 4, slides`: people count from one, and a list of steps holds a step. */
function pathInWords(path: readonly (string | number)[]): string {
  const words: string[] = [];
  for (const part of path) {
    const list = words.at(-1);
    if (typeof part === 'string') words.push(part);
    else words.splice(-1, list ? 1 : 0, `${list?.replace(/s$/u, '') ?? 'item'} ${part + 1}`);
  }
  return words.join(', ') || 'as a whole';
}

function lineInWords({ line, column }: { readonly line: number | null; readonly column: string | null }): string {
  const parts = [line === null ? '' : `line ${line}`, column === null ? '' : `column ${shortened(column)}`];
  return parts.filter((part) => part !== '').join(', ') || 'the file';
}

const LONGEST_QUOTE = 60;

function shortened(text: string): string {
  const characters = [...text.slice(0, 4 * LONGEST_QUOTE)];
  return characters.length > LONGEST_QUOTE ? `${characters.slice(0, LONGEST_QUOTE).join('')}…` : text;
}

function q(text: string | undefined): string {
  return text === undefined || text === '' ? 'What is given' : `“${shortened(text)}”`;
}

function expecting({ expected }: Detail): string {
  return expected === undefined ? '' : `; expected: ${expected}`;
}

function suchAs({ expected }: Detail): string {
  return expected === undefined ? '' : `, such as ${expected}`;
}

function but({ found }: Detail): string {
  return found === undefined ? '' : `, found: ${shortened(found)}`;
}

function inside({ found }: Detail): string {
  return found === undefined ? '' : ` (${found})`;
}

function places(count: string | undefined): string {
  return count === '1' ? '1 wheel' : `${count} wheels`;
}
