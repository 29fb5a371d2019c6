import { z } from 'zod';
import { LIMITS } from './limits';

// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is kept out.
const CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/u;

/** Characters as people and the database count them, so that a note in any script has the same room. */
function within(from: number, to: number): (text: string) => boolean {
  return (text) => {
    const length = [...text].length;
    return length >= from && length <= to;
  };
}

/** Half a character (a lone surrogate) would be stored as another one, in silence. */
const whole = (text: string): boolean => text.isWellFormed();
const BROKEN = 'Take out the broken character.';

function prose(from: number, to: number, error: string): z.ZodType<string, string> {
  return z
    .string({ error })
    .overwrite((text) => text.replaceAll('\r\n', '\n').trim())
    .refine(within(from, to), { error })
    .refine((text) => !CONTROL.test(text), { error: 'Take out control characters.' })
    .refine(whole, { error: BROKEN });
}

/** What a run is called: one line, or nothing. */
export const titleText = z
  .string({ error: `Give at most ${LIMITS.nameLength} characters.` })
  .trim()
  .refine(within(0, LIMITS.nameLength), { error: `Give at most ${LIMITS.nameLength} characters.` })
  .refine((text) => !CONTROL.test(text) && !/[\n\r\t]/u.test(text), { error: 'Take out line breaks and tabs.' })
  .refine(whole, { error: BROKEN });

export const runNoteText = prose(0, LIMITS.runNoteLength, `Give at most ${LIMITS.runNoteLength} characters.`);
export const reasonText = prose(
  1,
  LIMITS.reasonLength,
  `Give a reason of 1 to ${LIMITS.reasonLength} characters; it stays with the run.`,
);

/** What a tester wrote beside a step, kept to the letter as an imported file's notes are. */
export const stepNoteText = z
  .string({ error: `Give at most ${LIMITS.noteLength} characters.` })
  .refine(within(0, LIMITS.noteLength), { error: `Give at most ${LIMITS.noteLength} characters.` })
  .refine((text) => !text.includes('\0'), { error: 'Take out the character U+0000.' })
  .refine(whole, { error: BROKEN });
