import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  date,
  foreignKey,
  index,
  integer,
  numeric,
  pgTable,
  primaryKey,
  text,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { SUBTRACTIONS } from '@/lib/mechanism/layout';
import { REGISTERS } from '@/lib/mechanism/steps';
import { MACHINE_STATES } from '@/lib/schemas/machines';
import { id, instant, ofWorkshop, oneOf, workshopId } from './columns';
import { membership, workshop } from './people';

export const machine = pgTable(
  'machine',
  {
    workshopId: workshopId().references(() => workshop.id, { onDelete: 'cascade' }),
    id: id(),
    name: text('name').notNull(),
    serial: text('serial').notNull().default(''),
    /** Times its original's size, as people say it ("twice" = 2); null = not a scaled build. */
    scale: numeric('scale', { precision: 6, scale: 3, mode: 'number' }),
    state: text('state', { enum: MACHINE_STATES }).notNull().default('being-built'),
    /** Turns made before the log began; the odometer is this and every logged turn. */
    turnsBefore: bigint('turns_before', { mode: 'number' }).notNull().default(0),
    layoutRevision: integer('layout_revision').notNull().default(1),
    note: text('note').notNull().default(''),
    /** Rises with every change; an edit that saw an older one is refused instead of overwriting. */
    version: integer('version').notNull().default(1),
    createdAt: instant('created_at').notNull().defaultNow(),
    createdBy: uuid('created_by').notNull(),
    updatedAt: instant('updated_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.id] }),
    uniqueIndex('machine_name').on(t.workshopId, sql`lower(${t.name})`),
    foreignKey({
      columns: [t.workshopId, t.createdBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    oneOf('machine_state', 'state', MACHINE_STATES),
    check('machine_name_length', sql`char_length(name) between 1 and 80`),
    check('machine_scale', sql`scale is null or (scale > 0 and scale <= 100)`),
    check('machine_turns_before', sql`turns_before >= 0`),
    ofWorkshop('machine'),
  ],
);

/** The layouts a machine has had. A revision that a run was logged on is never changed. */
export const machineLayout = pgTable(
  'machine_layout',
  {
    workshopId: workshopId(),
    machineId: uuid('machine_id').notNull(),
    revision: integer('revision').notNull(),
    settingSlides: integer('setting_slides').notNull(),
    resultWheels: integer('result_wheels').notNull(),
    counterWheels: integer('counter_wheels').notNull(),
    carriagePositions: integer('carriage_positions').notNull(),
    subtraction: text('subtraction', { enum: SUBTRACTIONS }).notNull(),
    complementColumns: integer('complement_columns'),
    resultCarry: integer('result_carry'),
    counterCarry: boolean('counter_carry').notNull(),
    createdAt: instant('created_at').notNull().defaultNow(),
    createdBy: uuid('created_by').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.machineId, t.revision] }),
    foreignKey({ columns: [t.workshopId, t.machineId], foreignColumns: [machine.workshopId, machine.id] }).onDelete(
      'cascade',
    ),
    foreignKey({
      columns: [t.workshopId, t.createdBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    oneOf('machine_layout_subtraction', 'subtraction', SUBTRACTIONS),
    check('machine_layout_revision', sql`revision >= 1`),
    check(
      'machine_layout_counts',
      sql`setting_slides between 1 and 32 and result_wheels between 1 and 32 and counter_wheels between 0 and 32
        and carriage_positions between 1 and 32 and complement_columns between 1 and 32 and result_carry between 0 and 32`,
    ),
    ofWorkshop('machine_layout'),
  ],
);

/** A position that is known not to be ready. Ended, not deleted: what was left out when is part of the record. */
export const exclusion = pgTable(
  'exclusion',
  {
    workshopId: workshopId(),
    id: id(),
    machineId: uuid('machine_id').notNull(),
    register: text('register', { enum: REGISTERS }).notNull(),
    wheel: integer('wheel').notNull(),
    reason: text('reason').notNull(),
    since: date('since', { mode: 'string' }).notNull(),
    createdAt: instant('created_at').notNull().defaultNow(),
    createdBy: uuid('created_by').notNull(),
    endedAt: instant('ended_at'),
    endedBy: uuid('ended_by'),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.id] }),
    index('exclusion_by_machine').on(t.workshopId, t.machineId),
    uniqueIndex('exclusion_open').on(t.workshopId, t.machineId, t.register, t.wheel).where(sql`ended_at is null`),
    foreignKey({ columns: [t.workshopId, t.machineId], foreignColumns: [machine.workshopId, machine.id] }).onDelete(
      'cascade',
    ),
    foreignKey({
      columns: [t.workshopId, t.createdBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    foreignKey({
      columns: [t.workshopId, t.endedBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    oneOf('exclusion_register', 'register', REGISTERS),
    check('exclusion_wheel', sql`wheel between 1 and 32`),
    check('exclusion_reason', sql`char_length(reason) between 1 and 500`),
    check('exclusion_ended_by', sql`(ended_at is null) = (ended_by is null)`),
    ofWorkshop('exclusion'),
  ],
);
