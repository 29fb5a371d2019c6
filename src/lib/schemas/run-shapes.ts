import { z } from 'zod';
import { REGISTERS } from '@/lib/mechanism/steps';
import { oneOf, wholeLayoutSchema, wholeNumber } from './layout';
import { zoneSchema } from './people';
import { reasonText, runNoteText, stepNoteText, titleText } from './run-text';
import { RUN_SOURCES } from './runs';
import { placeSchema, readingSchema, startSchema, stepSchema } from './steps';

/** Most steps appended in one call; longer runs come in several. */
export const MOST_APPENDED = 500;
/** Runs of one answer, at most. */
export const MOST_LISTED = 1000;
const MOST_SEQ = 2 ** 31 - 1;

const OBJECT = { error: 'Give an object.' };
const uuid = z.uuid({ error: 'Give an id (UUID).' }).overwrite((text) => text.toLowerCase());

/** When something was done: the instant in UTC and the offset of the tester's own clock. */
export const momentSchema = z
  .strictObject(
    {
      instant: z.iso.datetime({ error: 'Give an instant in UTC, such as 2026-03-01T08:15:00Z.' }),
      offsetMinutes: wholeNumber(-1439, 1439),
    },
    OBJECT,
  )
  .meta({ id: 'Moment', description: 'An instant in UTC, and how many minutes the tester’s clock was ahead of it.' });
export type RunMoment = z.infer<typeof momentSchema>;

/** A run to be started. The machine's current layout and open exclusions are frozen with it. */
export const newRunSchema = z
  .strictObject(
    {
      machine: uuid,
      title: titleText.optional(),
      note: runNoteText.optional(),
      zone: zoneSchema.optional().meta({ description: 'IANA time zone of the tester; the workshop’s when left out.' }),
      source: oneOf(['hand', 'api']).optional().meta({ default: 'hand' }),
      start: startSchema.optional(),
    },
    OBJECT,
  )
  .meta({ id: 'NewRun', description: 'A run to be started.' });
export type NewRun = z.infer<typeof newRunSchema>;

/** What of a run may change at any time. */
export const runChangeSchema = z
  .strictObject({ title: titleText.optional(), note: runNoteText.optional() }, OBJECT)
  .meta({ id: 'RunChange', description: 'What of a run is to change; a field left out stays.' });
export type RunChange = z.infer<typeof runChangeSchema>;

/** One step as the page that logged it sends it. */
export const newEntrySchema = z
  .strictObject(
    {
      id: uuid.meta({ description: 'Made by the sender (version 7 sorts best); sent again, it is stored once.' }),
      step: stepSchema,
      note: stepNoteText.optional(),
      at: momentSchema.nullable().optional(),
    },
    OBJECT,
  )
  .meta({ id: 'NewEntry', description: 'A step to be logged.' });
export type NewEntry = z.infer<typeof newEntrySchema>;

/** Steps to be added; `seq` is the number that the first of them is to have. */
export const appendSchema = z
  .strictObject(
    {
      seq: wholeNumber(1, MOST_SEQ).meta({ description: 'Number that the first of these steps is to have.' }),
      entries: z
        .array(newEntrySchema, { error: 'Give a list of steps.' })
        .min(1, { error: 'Give at least one step.' })
        .max(MOST_APPENDED, {
          error: `At most ${MOST_APPENDED} steps are taken in one call; send the rest in another.`,
        })
        .refine((entries) => new Set(entries.map(({ id }) => id)).size === entries.length, {
          error: 'Give every step an id of its own.',
        }),
    },
    OBJECT,
  )
  .meta({ id: 'Append', description: 'Steps to be added to a run.' });
export type Append = z.infer<typeof appendSchema>;

export const takeBackSchema = z.strictObject({ reason: reasonText }, OBJECT).meta({ id: 'TakeBack' });

/** A reading to be put right, or to be added where a step had none. It replaces the whole reading. */
export const correctionSchema = z
  .strictObject(
    {
      seq: wholeNumber(1, MOST_SEQ),
      reading: readingSchema.refine(({ result, counter }) => result !== undefined || counter !== undefined, {
        error: 'Give the result, the counter or both; ? stands for a wheel that could not be read.',
      }),
      reason: reasonText
        .optional()
        .meta({ description: 'Needed where a reading is replaced; a reading that is only added has none.' }),
      replaces: uuid
        .nullable()
        .optional()
        .meta({ description: 'The readingId that was seen; 409 when another one stands there meanwhile.' }),
    },
    OBJECT,
  )
  .meta({ id: 'Correction', description: 'A reading in place of another, or where there was none.' });
export type Correction = z.infer<typeof correctionSchema>;

const named = z.object({ id: z.uuid(), name: z.string() });
const faultPlaceSchema = z.object({ register: z.enum(REGISTERS), wheel: z.int(), seq: z.int() });

/** A run in a line, with its tallies over the steps that stand. */
export const runSummarySchema = z
  .object({
    id: z.uuid(),
    number: z.int().meta({ description: 'Counts up within the workshop.' }),
    machine: named,
    title: z.string(),
    tester: named,
    source: z.enum(RUN_SOURCES),
    startedAt: z.iso.datetime(),
    finishedAt: z.iso.datetime().nullable(),
    turns: z.int(),
    steps: z.int(),
    readings: z.int(),
    disagreeing: z.int().meta({ description: 'Readings in which a wheel differs or stands between numerals.' }),
    firstFault: faultPlaceSchema.nullable(),
  })
  .meta({ id: 'RunSummary', description: 'A run in a line.' });
export type RunSummary = z.infer<typeof runSummarySchema>;

const doneSchema = z.object({ who: z.string(), when: z.iso.datetime(), why: z.string() });

/** One step of a run as it stands now, with everything that was put right or taken back. */
export const runEntrySchema = z
  .object({
    seq: z.int(),
    id: z.uuid(),
    step: stepSchema.meta({ description: 'With its reading as it stands now, corrections taken in.' }),
    note: z.string(),
    at: momentSchema.nullable(),
    by: z.string().meta({ description: 'Who logged it.' }),
    readingId: z.uuid().nullable(),
    corrections: z
      .array(doneSchema.extend({ was: readingSchema }))
      .meta({ description: 'Readings that were replaced, oldest first.' }),
    withdrawn: doneSchema.nullable().meta({ description: 'Set where the step was taken back.' }),
  })
  .meta({ id: 'RunEntry', description: 'A step of a run.' });
export type RunEntry = z.infer<typeof runEntrySchema>;

/** A whole run. */
export const runSchema = z
  .object({
    ...runSummarySchema.shape,
    note: z.string(),
    zone: z.string(),
    layout: wholeLayoutSchema,
    layoutRevision: z.int(),
    start: z.object({ result: z.string().optional(), counter: z.string().optional() }),
    excluded: z.array(placeSchema.extend({ reason: z.string() })),
    file: z.object({ name: z.string() }).nullable().meta({ description: 'The file it was imported from.' }),
    entries: z.array(runEntrySchema),
  })
  .meta({ id: 'Run', description: 'A run with all its steps.' });
export type RunShown = z.infer<typeof runSchema>;

/** Which runs a list is to hold. */
export const runQuerySchema = z.strictObject({
  machine: uuid.optional().meta({ description: 'Runs of this machine only.' }),
  before: uuid.optional().meta({ description: 'The `next` of the answer before.' }),
  limit: z.coerce
    .number()
    .pipe(wholeNumber(1, MOST_LISTED))
    .optional()
    .meta({ description: `Runs of one answer; ${MOST_LISTED} when left out.` }),
});

/** A page of runs, latest first; `next` goes on as `before` where there are more. */
export const runListSchema = z.object({ runs: z.array(runSummarySchema), next: z.uuid().nullable() });
export type RunList = z.infer<typeof runListSchema>;

/** What became of steps, or of a correction, and the tallies after it. */
export const loggedSchema = z
  .object({
    run: runSummarySchema,
    entries: z.array(runEntrySchema).meta({ description: 'The steps concerned, as stored.' }),
    remarks: z
      .array(z.object({ seq: z.int(), register: z.enum(REGISTERS), what: z.string() }))
      .meta({ description: 'What was filled in, such as zeros on the left.' }),
  })
  .meta({ id: 'Logged' });
export type Logged = z.infer<typeof loggedSchema>;
