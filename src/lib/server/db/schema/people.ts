import { sql } from 'drizzle-orm';
import { check, foreignKey, index, pgPolicy, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { ROLES } from '@/lib/policy';
import { id, instant, oneOf, workshopId } from './columns';

/** A tenant. Visible from inside, and to a signed-in person who belongs to it. */
export const workshop = pgTable(
  'workshop',
  {
    id: id().primaryKey(),
    name: text('name').notNull(),
    /** IANA time zone in which the workshop's pages show times. */
    zone: text('zone').notNull().default('UTC'),
    createdAt: instant('created_at').notNull().defaultNow(),
  },
  () => [
    check('workshop_name_length', sql`char_length(name) between 1 and 80`),
    pgPolicy('workshop_itself', {
      for: 'all',
      using: sql`id = nineover_workshop()`,
      withCheck: sql`id = nineover_workshop()`,
    }),
    pgPolicy('workshop_of_member', {
      for: 'select',
      using: sql`exists (select 1 from membership m where m.workshop_id = id and m.person_id = nineover_person() and m.ended_at is null)`,
    }),
  ],
);

/** Somebody with a name. May belong to several workshops; the password lies elsewhere. */
export const person = pgTable(
  'person',
  {
    id: id().primaryKey(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    createdAt: instant('created_at').notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex('person_email').on(t.email),
    check('person_email_lower', sql`email = lower(email) and char_length(email) between 3 and 254`),
    check('person_name_length', sql`char_length(name) between 1 and 80`),
    pgPolicy('person_themself', {
      for: 'all',
      using: sql`id = nineover_person()`,
      withCheck: sql`id = nineover_person()`,
    }),
    pgPolicy('person_by_email', { for: 'select', using: sql`email = nineover_email()` }),
    pgPolicy('person_of_workshop', {
      for: 'select',
      using: sql`exists (select 1 from membership m where m.person_id = id and m.workshop_id = nineover_workshop())`,
    }),
  ],
);

/** A password's hash, apart from the person, so that no query about people can bring it along. */
export const credential = pgTable(
  'credential',
  {
    personId: uuid('person_id')
      .primaryKey()
      .references(() => person.id, { onDelete: 'cascade' }),
    passwordHash: text('password_hash').notNull(),
    changedAt: instant('changed_at').notNull().defaultNow(),
  },
  () => [
    pgPolicy('credential_of_person', {
      for: 'all',
      using: sql`person_id = nineover_person()`,
      withCheck: sql`person_id = nineover_person()`,
    }),
  ],
);

/** Membership is ended, never deleted: a removed person's runs keep their name. */
export const membership = pgTable(
  'membership',
  {
    workshopId: workshopId().references(() => workshop.id, { onDelete: 'cascade' }),
    personId: uuid('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'restrict' }),
    role: text('role', { enum: ROLES }).notNull(),
    createdAt: instant('created_at').notNull().defaultNow(),
    endedAt: instant('ended_at'),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.personId] }),
    index('membership_by_person').on(t.personId),
    oneOf('membership_role', 'role', ROLES),
    pgPolicy('membership_of_workshop', {
      for: 'all',
      using: sql`workshop_id = nineover_workshop()`,
      withCheck: sql`workshop_id = nineover_workshop()`,
    }),
    pgPolicy('membership_of_person', { for: 'select', using: sql`person_id = nineover_person()` }),
  ],
);

/** A one-time link. Only its hash is kept; whoever holds the token sees this row and no other. */
export const invitation = pgTable(
  'invitation',
  {
    workshopId: workshopId().references(() => workshop.id, { onDelete: 'cascade' }),
    id: id(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    role: text('role', { enum: ROLES }).notNull(),
    tokenHash: text('token_hash').notNull(),
    createdBy: uuid('created_by').notNull(),
    createdAt: instant('created_at').notNull().defaultNow(),
    expiresAt: instant('expires_at').notNull(),
    acceptedAt: instant('accepted_at'),
    revokedAt: instant('revoked_at'),
  },
  (t) => [
    primaryKey({ columns: [t.workshopId, t.id] }),
    uniqueIndex('invitation_token').on(t.tokenHash),
    uniqueIndex('invitation_open').on(t.workshopId, t.email).where(sql`accepted_at is null and revoked_at is null`),
    foreignKey({
      columns: [t.workshopId, t.createdBy],
      foreignColumns: [membership.workshopId, membership.personId],
    }).onDelete('restrict'),
    oneOf('invitation_role', 'role', ROLES),
    check('invitation_email_lower', sql`email = lower(email)`),
    pgPolicy('invitation_of_workshop', {
      for: 'all',
      using: sql`workshop_id = nineover_workshop()`,
      withCheck: sql`workshop_id = nineover_workshop()`,
    }),
    pgPolicy('invitation_of_holder', { for: 'select', using: sql`token_hash = nineover_invitation()` }),
  ],
);

/** One row behind each signed-in browser: taking it away signs that browser out at its next request. */
export const session = pgTable(
  'session',
  {
    id: id().primaryKey(),
    personId: uuid('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'cascade' }),
    /** The workshop this browser stands in; null when the person belongs to none any more. */
    workshopId: uuid('workshop_id').references(() => workshop.id, { onDelete: 'set null' }),
    createdAt: instant('created_at').notNull().defaultNow(),
    seenAt: instant('seen_at').notNull().defaultNow(),
    expiresAt: instant('expires_at').notNull(),
    address: text('address'),
    agent: text('agent'),
  },
  (t) => [
    index('session_by_person').on(t.personId),
    pgPolicy('session_by_id', {
      for: 'all',
      using: sql`id = nineover_session()`,
      withCheck: sql`id = nineover_session()`,
    }),
    pgPolicy('session_of_person', {
      for: 'all',
      using: sql`person_id = nineover_person()`,
      withCheck: sql`person_id = nineover_person()`,
    }),
  ],
);
