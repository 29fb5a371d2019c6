import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  smallint,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Place } from '@/lib/comparison/compare';
import { CLEARABLE, OPERATIONS, WAYS } from '@/lib/mechanism/steps';
import { RUN_SOURCES } from '@/lib/schemas/runs';
import { bytes } from './bytes';
import { id, instant, ofWorkshop, oneOf, workshopId } from './columns';
import { machine, machineLayout } from './machines';
import { membership } from './people';

/** What was left out of the judgement when the run began, kept with the run so that its judgement never moves. */
export interface RunExclusion extends Place {
  readonly reason: string;
}

/** One sitting at one machine. The tallies are kept with each append, so that lists need not judge every run again. */
export const run = pgTable(
  'run',
  {
    workshopId: workshopId(),
    id: id(),
    /** Counts up within the workshop; what people call the run by. */
    number: integer('number').notNull(),
    machineId: uuid('machine_id').notNull(),
    layoutRevision: integer('layout_revision').notNull(),
    title: text('title').notNull().default(''),
    note: text('note').notNull().default(''),
    source: text('source', { enum: RUN_SOURCES }).notNull().default('hand'),
    testerId: uuid('tester_id').notNull(),
    /** IANA time zone of the tester. */
    zone: text('zone').notNull().default('UTC'),
    startResult: text('start_result'),
    startCounter: text('start_counter'),
    excluded: jsonb('excluded').$type<RunExclusion[]>().notNull().default([]),
    startedAt: instant('started_at').notNull().defaultNow(),
    finishedAt: instant('finished_at'),
    finishedBy: uuid('finished_by'),
    steps: integer('steps').notNull().default(0),
    turns: bigint('turns', { mode: 'number' }).notNull().default(0),
    readings: integer('readings').notNull().default(0),
    /** Readings in which at least one wheel differs or stands between numerals. */
    disagreeing: integer('disagreeing').notNull().default(0),
    firstFault: jsonb('first_fault').$type<(Place & { readonly seq: number }) | null>(),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.id] }),
    unique('run_number').on(t.workshopId, t.number),
    index('run_by_machine').on(t.workshopId, t.machineId, t.startedAt),
    foreignKey({ columns: [t.workshopId, t.machineId], foreignColumns: [machine.workshopId, machine.id] }).onDelete(
      'restrict',
    ),
    foreignKey({
      columns: [t.workshopId, t.machineId, t.layoutRevision],
      foreignColumns: [machineLayout.workshopId, machineLayout.machineId, machineLayout.revision],
    }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.testerId],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.finishedBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    oneOf('run_source', 'source', RUN_SOURCES),
    check('run_tallies', sql`steps >= 0 and turns >= 0 and readings >= 0 and disagreeing between 0 and readings`),
    check('run_finished_by', sql`(finished_at is null) = (finished_by is null)`),
    check('run_text', sql`char_length(title) <= 80 and char_length(note) <= 2000`),
    ofWorkshop('run'),
  ],
);

/** One operation of a run. Rows are only added; a step taken back stays, marked, and is left out of the judgement. */
export const runStep = pgTable(
  'run_step',
  {
    workshopId: workshopId(),
    runId: uuid('run_id').notNull(),
    seq: integer('seq').notNull(),
    /** Made by the page that logged it, so that sending it twice stores it once. */
    id: id(),
    do: text('do', { enum: OPERATIONS }).notNull(),
    slides: text('slides'),
    carriage: integer('carriage'),
    way: text('way', { enum: WAYS }),
    times: integer('times'),
    reversed: boolean('reversed'),
    clear: text('clear', { enum: CLEARABLE }),
    note: text('note').notNull().default(''),
    /** When it was done, with the offset it was told in (minutes east of UTC); null = not known. */
    at: instant('at'),
    atOffset: smallint('at_offset'),
    recordedAt: instant('recorded_at').notNull().defaultNow(),
    recordedBy: uuid('recorded_by').notNull(),
    withdrawnAt: instant('withdrawn_at'),
    withdrawnBy: uuid('withdrawn_by'),
    withdrawnReason: text('withdrawn_reason'),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.runId, t.seq] }),
    uniqueIndex('run_step_id').on(t.workshopId, t.id),
    foreignKey({ columns: [t.workshopId, t.runId], foreignColumns: [run.workshopId, run.id] }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.recordedBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.withdrawnBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    oneOf('run_step_do', 'do', OPERATIONS),
    check('run_step_seq', sql`seq >= 1`),
    check(
      'run_step_fields',
      sql`(("do" = 'set') = (slides is not null)) and (("do" = 'shift') = (carriage is not null))
        and (("do" = 'turn') = (way is not null)) and (("do" = 'turn') = (times is not null))
        and (("do" = 'reverse') = (reversed is not null)) and (("do" = 'clear') = (clear is not null))`,
    ),
    check('run_step_slides', sql`slides ~ '^[0-9]{1,32}$'`),
    check('run_step_ranges', sql`times between 1 and 1000000 and carriage between 1 and 32`),
    check('run_step_at', sql`(at is null) = (at_offset is null) and at_offset between -1439 and 1439`),
    check('run_step_note', sql`char_length(note) <= 500`),
    check(
      'run_step_withdrawn',
      sql`(withdrawn_at is null) = (withdrawn_by is null) and (withdrawn_at is null) = (withdrawn_reason is null)`,
    ),
    ofWorkshop('run_step'),
  ],
);

/** What stood in the windows after a step. Append-only: a correction is a new row that names the one it replaces. */
export const reading = pgTable(
  'reading',
  {
    workshopId: workshopId(),
    id: id(),
    runId: uuid('run_id').notNull(),
    seq: integer('seq').notNull(),
    result: text('result'),
    counter: text('counter'),
    recordedAt: instant('recorded_at').notNull().defaultNow(),
    recordedBy: uuid('recorded_by').notNull(),
    replaces: uuid('replaces'),
    reason: text('reason'),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.id] }),
    index('reading_by_step').on(t.workshopId, t.runId, t.seq),
    // One first reading a step, and one correction of each reading: the chain cannot fork.
    uniqueIndex('reading_first').on(t.workshopId, t.runId, t.seq).where(sql`replaces is null`),
    uniqueIndex('reading_correction').on(t.workshopId, t.replaces),
    foreignKey({
      columns: [t.workshopId, t.runId, t.seq],
      foreignColumns: [runStep.workshopId, runStep.runId, runStep.seq],
    }).onDelete('restrict'),
    foreignKey({ columns: [t.workshopId, t.replaces], foreignColumns: [t.workshopId, t.id] }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.recordedBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    check('reading_not_empty', sql`result is not null or counter is not null`),
    check('reading_glyphs', sql`result ~ '^([0-9]~?|[?]){1,32}$' and counter ~ '^([0-9]~?|[?]){1,32}$'`),
    check('reading_reason', sql`(replaces is null) = (reason is null) and char_length(reason) between 1 and 500`),
    ofWorkshop('reading'),
  ],
);

/** The file a run was imported from, byte for byte. */
export const runFile = pgTable(
  'run_file',
  {
    workshopId: workshopId(),
    runId: uuid('run_id').notNull(),
    name: text('name').notNull(),
    sha256: text('sha256').notNull(),
    content: bytes('content').notNull(),
    createdAt: instant('created_at').notNull().defaultNow(),
    createdBy: uuid('created_by').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.runId] }),
    index('run_file_sha256').on(t.workshopId, t.sha256),
    foreignKey({ columns: [t.workshopId, t.runId], foreignColumns: [run.workshopId, run.id] }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.createdBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    check('run_file_size', sql`octet_length(content) <= 1048576 and char_length(name) between 1 and 255`),
    ofWorkshop('run_file'),
  ],
);
