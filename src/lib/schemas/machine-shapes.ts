import { z } from 'zod';
import { REGISTERS } from '@/lib/mechanism/steps';
import { layoutSchema, oneOf, wholeLayoutSchema, wholeNumber } from './layout';
import { LIMITS } from './limits';
import { MACHINE_STATES, MOST_SCALE, MOST_TURNS_BEFORE } from './machines';

// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is kept out.
const CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/u;

/** A line of text: trimmed, no line breaks or other control characters. */
function line(from: number, to: number, error: string): z.ZodType<string, string> {
  return z
    .string({ error })
    .trim()
    .min(from, { error })
    .max(to, { error })
    .refine((text) => !CONTROL.test(text) && !/[\n\r\t]/u.test(text), {
      error: 'Take out line breaks and tabs.',
    });
}

/** Text of several lines, with line ends as LF. */
function lines(from: number, to: number, error: string): z.ZodType<string, string> {
  return z
    .string({ error })
    .overwrite((text) => text.replaceAll('\r\n', '\n').trim())
    .min(from, { error })
    .max(to, { error })
    .refine((text) => !CONTROL.test(text), {
      error: 'Take out control characters.',
    });
}

const SCALE = `Give a number above 0 and up to ${MOST_SCALE}, with at most three decimals, or null.`;

const name = line(1, LIMITS.nameLength, `Give a name of 1 to ${LIMITS.nameLength} characters.`);
const serial = line(0, LIMITS.nameLength, `Give at most ${LIMITS.nameLength} characters.`);
const note = lines(0, LIMITS.runNoteLength, `Give at most ${LIMITS.runNoteLength} characters.`);
const scale = z
  .number({ error: SCALE })
  .min(0.001, { error: SCALE })
  .max(MOST_SCALE, { error: SCALE })
  .refine((value) => Number(value.toFixed(3)) === value, { error: SCALE })
  .nullable()
  .meta({
    description: "Times its original's size; null = not a scaled build.",
  });
const state = oneOf(MACHINE_STATES);
const turnsBefore = wholeNumber(0, MOST_TURNS_BEFORE).meta({
  description: 'Turns made before the log began.',
});

/** A machine to be entered. */
export const newMachineSchema = z
  .strictObject(
    {
      name,
      serial: serial.optional(),
      scale: scale.optional(),
      state: state.optional().meta({ default: 'being-built' }),
      turnsBefore: turnsBefore.optional(),
      note: note.optional(),
      layout: layoutSchema.optional(),
    },
    { error: 'Give an object.' },
  )
  .meta({ id: 'NewMachine', description: 'A machine to be entered.' });
export type NewMachine = z.infer<typeof newMachineSchema>;

/** What of a machine is to change; a field left out stays. */
export const machineChangeSchema = z
  .strictObject(
    {
      version: wholeNumber(1, 2 ** 31 - 1)
        .optional()
        .meta({
          description: 'The version that was seen; or as If-Match: "version".',
        }),
      name: name.optional(),
      serial: serial.optional(),
      scale: scale.optional(),
      state: state.optional(),
      turnsBefore: turnsBefore.optional(),
      note: note.optional(),
      layout: layoutSchema.optional().meta({
        description: 'The whole layout. A layout in use is not changed: it gets a new revision.',
      }),
    },
    { error: 'Give an object.' },
  )
  .meta({
    id: 'MachineChange',
    description: 'What of a machine is to change.',
  });
export type MachineChange = z.infer<typeof machineChangeSchema>;

/** A position to be left out of the judgement. */
export const newExclusionSchema = z
  .strictObject(
    {
      register: oneOf(REGISTERS),
      wheel: wholeNumber(1, 32),
      reason: lines(1, LIMITS.reasonLength, `Give a reason of 1 to ${LIMITS.reasonLength} characters.`),
      since: z.iso.date({ error: 'Give a date as year-month-day.' }).optional().meta({
        description: 'First day; today in the workshop when left out.',
      }),
    },
    { error: 'Give an object.' },
  )
  .meta({
    id: 'NewExclusion',
    description: 'A wheel to be left out of the judgement.',
  });
export type NewExclusion = z.infer<typeof newExclusionSchema>;

/** The one change that an exclusion can have. */
export const exclusionEndSchema = z
  .strictObject(
    { ended: z.literal(true, { error: 'Give true; an exclusion that has ended is not taken up again.' }) },
    { error: 'Give an object.' },
  )
  .meta({ id: 'ExclusionEnd', description: 'Ends an exclusion: the wheel counts again from now on.' });

export const exclusionSchema = z
  .object({
    id: z.uuid(),
    register: z.enum(REGISTERS),
    wheel: z.int(),
    reason: z.string(),
    since: z.iso.date(),
    by: z.string().meta({ description: 'Who excluded it.' }),
    endedAt: z.iso.datetime().nullable(),
    endedBy: z.string().nullable(),
  })
  .meta({
    id: 'Exclusion',
    description: 'A wheel left out of the judgement; kept when ended.',
  });
export type ExclusionShown = z.infer<typeof exclusionSchema>;

/** A run in a line: what came of it. */
export const runResultSchema = z
  .object({
    id: z.uuid(),
    number: z.int(),
    title: z.string(),
    startedAt: z.iso.datetime(),
    finishedAt: z.iso.datetime().nullable(),
    turns: z.int(),
    readings: z.int(),
    disagreeing: z.int().meta({
      description: 'Readings in which a wheel differs or stands between numerals.',
    }),
    firstFault: z.object({ seq: z.int(), register: z.enum(REGISTERS), wheel: z.int() }).nullable(),
  })
  .meta({ id: 'RunResult', description: 'A run in a line.' });
export type RunResult = z.infer<typeof runResultSchema>;

const machineFields = {
  id: z.uuid(),
  name: z.string(),
  serial: z.string(),
  scale: z.number().nullable(),
  state: z.enum(MACHINE_STATES),
  odometer: z.int().meta({ description: 'Turns before the log began and every logged turn.' }),
  layoutRevision: z.int(),
  layout: wholeLayoutSchema,
  openExclusions: z.int(),
  runs: z.int(),
  lastRun: runResultSchema.nullable(),
  version: z.int(),
};

export const machineSummarySchema = z
  .object(machineFields)
  .meta({ id: 'MachineSummary', description: 'A machine in a line.' });
export type MachineSummary = z.infer<typeof machineSummarySchema>;

export const layoutRevisionSchema = z
  .object({
    revision: z.int(),
    layout: wholeLayoutSchema,
    createdAt: z.iso.datetime(),
    by: z.string(),
    runs: z.int(),
  })
  .meta({
    id: 'LayoutRevision',
    description: 'A layout that the machine has had, and how many runs were logged on it.',
  });
export type LayoutRevision = z.infer<typeof layoutRevisionSchema>;

export const machineSchema = z
  .object({
    ...machineFields,
    turnsBefore: z.int(),
    note: z.string(),
    createdAt: z.iso.datetime(),
    updatedAt: z.iso.datetime(),
    revisions: z.array(layoutRevisionSchema),
    exclusions: z.array(exclusionSchema),
    latestRuns: z.array(runResultSchema),
  })
  .meta({ id: 'Machine', description: 'A machine.' });
export type MachineShown = z.infer<typeof machineSchema>;
