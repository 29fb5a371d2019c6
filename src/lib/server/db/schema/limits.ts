import { integer, pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from './columns';

/** Counted attempts (sign-in, public calls). Keys are hashes, so that no address or e-mail stands here in the clear. */
export const rateLimit = pgTable('rate_limit', {
  key: text('key').primaryKey(),
  points: integer('points').notNull().default(0),
  expire: instant('expire'),
});
