import { drizzle, type PostgresJsDatabase } from 'drizzle-orm/postgres-js';
import postgres from 'postgres';
import { settings } from '../settings';
import * as limits from './schema/limits';
import * as machines from './schema/machines';
import * as people from './schema/people';
import * as runs from './schema/runs';

export const schema = { ...people, ...machines, ...runs, ...limits };

export type Database = PostgresJsDatabase<typeof schema>;
/** A transaction inside a scope; the only thing that stores are given. */
export type Tx = Parameters<Parameters<Database['transaction']>[0]>[0];

export interface Connection {
  readonly db: Database;
  readonly close: () => Promise<void>;
}

/**
 * Opens a pool that works as `nineover_app` whatever role the URL logs in as: that role owns nothing, so row-level
 * security binds it.
 */
export function connect(url: string, options: { max?: number } = {}): Connection {
  const client = postgres(url, {
    max: options.max ?? 10,
    onnotice: () => {},
    connection: { application_name: 'nineover', role: 'nineover_app', TimeZone: 'UTC' },
  });
  return { db: drizzle(client, { schema }), close: () => client.end({ timeout: 5 }) };
}

let shared: Connection | undefined;

/** The application's own pool, opened at the first use. */
export function database(): Database {
  shared ??= connect(settings().databaseUrl);
  return shared.db;
}

/** For tests and shutting down: closes the pool, so that the next use opens a new one. */
export async function closeDatabase(): Promise<void> {
  const closing = shared;
  shared = undefined;
  await closing?.close();
}
