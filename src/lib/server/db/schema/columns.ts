import { sql } from 'drizzle-orm';
import { check, pgPolicy, timestamp, uuid } from 'drizzle-orm/pg-core';
import { v7 } from 'uuid';

/** Ids sort by the time they were made, so that indexes grow at one end. */
export const id = () => uuid('id').notNull().$defaultFn(v7);

export const workshopId = () => uuid('workshop_id').notNull();

/** An instant; PostgreSQL keeps UTC, the application writes and reads offsets. */
export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: 'date', precision: 3 });

/** The wall behind the queries: outside a workshop's transaction its rows do not exist. */
export const ofWorkshop = (table: string) =>
  pgPolicy(`${table}_of_workshop`, {
    for: 'all',
    using: sql`workshop_id = nineover_workshop()`,
    withCheck: sql`workshop_id = nineover_workshop()`,
  });

/** A check that a text column holds one of a closed set, from the array that the types come from. */
export const oneOf = (name: string, column: string, values: readonly string[]) =>
  check(name, sql.raw(`"${column}" in (${values.map((value) => `'${value}'`).join(', ')})`));
