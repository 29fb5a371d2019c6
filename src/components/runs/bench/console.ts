import type { Layout } from '@/lib/mechanism/layout';
import { MOST_TIMES, type Operation, type Step, type Way } from '@/lib/mechanism/steps';
import { acceptStep, readingOf, takeApart } from './reading';

/** What the entry line is asking for. */
export const ASKING = ['reading', 'slides', 'carriage', 'times', 'clear', 'note'] as const;
export type Asking = (typeof ASKING)[number];

/** The entry line of the bench. Pure: the page shows it and does what `Outcome` says. */
export interface Entry {
  readonly asking: Asking;
  readonly text: string;
  /** The turn that Enter logs with the reading. */
  readonly way: Way;
  readonly times: number;
  /** Goes with the next step. */
  readonly note: string;
  /** What to do or what is wrong; empty when the line is as it should be. */
  readonly said: string;
  readonly wrong: boolean;
}

export const FRESH: Entry = {
  asking: 'reading',
  text: '',
  way: 'add',
  times: 1,
  note: '',
  said: '',
  wrong: false,
};

/** What the page is to do besides showing the line. */
export type Deed = 'take-back' | 'correct' | 'finish' | 'keys';
export interface Outcome {
  readonly entry: Entry;
  readonly step?: Step;
  readonly note?: string;
  readonly deed?: Deed;
}

/** What the machine can do and how it stands, as far as the line must know. */
export interface Ground {
  readonly layout: Layout;
  readonly reversed: boolean;
}

/** Everything a key can do while a reading is asked for, with its words for the controls and the list of keys. */
export const COMMANDS = {
  slides: { keys: ['s'], word: 'Set slides' },
  carriage: { keys: ['c'], word: 'Shift carriage' },
  add: { keys: ['+', 'a'], word: 'Turn adding' },
  subtract: { keys: ['-', 'm'], word: 'Turn subtracting' },
  times: { keys: ['*', 'x'], word: 'Several turns' },
  reverse: { keys: ['r'], word: 'Reversing lever' },
  clear: { keys: ['z'], word: 'Clear' },
  bare: { keys: ['o'], word: 'Log without reading' },
  note: { keys: ['n'], word: 'Note' },
  'take-back': { keys: ['u'], word: 'Take back last' },
  correct: { keys: ['e'], word: 'Correct a reading' },
  finish: { keys: ['f'], word: 'Finish' },
  keys: { keys: ['k'], word: 'Keys' },
} as const satisfies Record<string, { keys: readonly string[]; word: string }>;
export type Command = keyof typeof COMMANDS;
export const COMMAND_NAMES = Object.keys(COMMANDS) as readonly Command[];

const BY_KEY = new Map<string, Command>(
  COMMAND_NAMES.flatMap((name) => COMMANDS[name].keys.map((key): [string, Command] => [key, name])),
);

const clean = (entry: Entry): Entry => ({ ...entry, said: '', wrong: false });
const ask = (entry: Entry, asking: Asking, said: string): Outcome => ({
  entry: {
    ...entry,
    asking,
    text: asking === 'note' ? entry.note : '',
    said,
    wrong: false,
  },
});
const refuse = (entry: Entry, said: string): Outcome => ({
  entry: { ...entry, said, wrong: true },
});

/** A step that is done: the line is fresh again, and goes on with the same turn. */
function log(entry: Entry, step: Step | string): Outcome {
  if (typeof step === 'string') return refuse(entry, step);
  const next = { ...FRESH, way: entry.way, times: entry.times };
  return { entry: next, step, note: entry.note };
}

const turnOf = ({ way, times }: Entry): Operation => ({
  do: 'turn',
  way,
  times,
});

/** Does a command, whether its key was typed or its control pressed. */
export function command(entry: Entry, name: Command, ground: Ground): Outcome {
  const { layout, reversed } = ground;
  switch (name) {
    case 'slides':
      return ask(entry, 'slides', 'Type the digits on the slides, then Enter.');
    case 'carriage':
      return ask(entry, 'carriage', `Type the position, 1 to ${layout.carriagePositions}, then Enter.`);
    case 'times':
      return ask(entry, 'times', 'Type how many turns are made before the next reading, then Enter.');
    case 'clear':
      return ask(entry, 'clear', 'Enter clears both. Or type r for the result, c for the counter.');
    case 'note':
      return ask(entry, 'note', 'Type a note for the next step, then Enter.');
    case 'add':
      return { entry: { ...clean(entry), asking: 'reading', way: 'add' } };
    case 'subtract':
      if (layout.subtraction === 'none') return refuse(entry, 'This machine does not subtract.');
      return { entry: { ...clean(entry), asking: 'reading', way: 'subtract' } };
    case 'reverse':
      return log({ ...entry, text: '' }, { do: 'reverse', on: !reversed });
    case 'bare':
      return log(entry, acceptStep(layout, turnOf(entry)));
    default:
      return { entry: clean(entry), deed: name };
  }
}

/** What stands in the line now. Letters and signs of commands act at once and do not stay in it. */
export function typeIn(entry: Entry, text: string, ground: Ground, pasted = false): Outcome {
  const changed = { ...clean(entry), text };
  if (pasted) return { entry: changed };
  if (entry.asking === 'clear') return typeClear(entry, text, ground);
  if (entry.asking !== 'reading') return { entry: changed };
  const key = [...text.toLowerCase()].find((character) => BY_KEY.has(character));
  const name = key === undefined ? undefined : BY_KEY.get(key);
  if (key === undefined || name === undefined) return { entry: changed };
  const rest = [...text].filter((character) => character.toLowerCase() !== key).join('');
  return command({ ...changed, text: rest }, name, ground);
}

const CLEARED: Readonly<Record<string, 'result' | 'counter' | 'both'>> = {
  r: 'result',
  c: 'counter',
  b: 'both',
};

function typeClear(entry: Entry, text: string, { layout }: Ground): Outcome {
  const what = CLEARED[text.trim().toLowerCase()];
  if (what === undefined)
    return refuse({ ...entry, text: '' }, 'Type r for the result, c for the counter, Enter for both.');
  return log(entry, acceptStep(layout, { do: 'clear', what }));
}

function enterReading(entry: Entry, layout: Layout): Outcome {
  const typed = takeApart(entry.text, layout);
  if (typeof typed === 'string') return refuse(entry, typed);
  const read = readingOf(typed);
  if (!read) return refuse({ ...entry, text: '' }, 'Type what stands in the windows, or o where you did not look.');
  const step = acceptStep(layout, turnOf(entry), read);
  if (typeof step === 'string') return refuse(entry, step);
  const onlyResult = layout.counterWheels > 0 && typed.counter === '' && !entry.text.includes('/');
  if (!onlyResult) return log(entry, step);
  return {
    entry: {
      ...entry,
      text: `${typed.result}/`,
      said: 'Now the counter. Enter leaves it unread.',
      wrong: false,
    },
  };
}

const whole = (text: string): number | null => (/^\s*\d{1,9}\s*$/u.test(text) ? Number(text) : null);

function enterTimes(entry: Entry): Outcome {
  const times = whole(entry.text);
  if (times === null || times < 1 || times > MOST_TIMES)
    return refuse(entry, `Give a whole number from 1 to ${MOST_TIMES.toLocaleString('en-GB')}.`);
  return { entry: { ...FRESH, note: entry.note, way: entry.way, times } };
}

/** Enter. */
export function enter(entry: Entry, { layout }: Ground): Outcome {
  switch (entry.asking) {
    case 'reading':
      return enterReading(entry, layout);
    case 'slides':
      return log(entry, acceptStep(layout, { do: 'set', slides: entry.text.trim() || '0' }));
    case 'carriage': {
      const to = whole(entry.text);
      if (to === null) return refuse(entry, `Give a position from 1 to ${layout.carriagePositions}.`);
      return log(entry, acceptStep(layout, { do: 'shift', to }));
    }
    case 'times':
      return enterTimes(entry);
    case 'clear':
      return log(entry, acceptStep(layout, { do: 'clear', what: 'both' }));
    case 'note':
      return {
        entry: {
          ...clean(entry),
          asking: 'reading',
          note: entry.text.trim().slice(0, 500),
          text: '',
        },
      };
  }
}

/** Escape: back to the reading, and from there to an empty line. */
export function leave(entry: Entry): Outcome {
  return { entry: { ...clean(entry), asking: 'reading', text: '' } };
}
