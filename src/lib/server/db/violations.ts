import { DrizzleQueryError } from 'drizzle-orm';
import postgres from 'postgres';

/** The name of the unique constraint or index that a query ran into, or null for any other error. */
export function uniqueViolation(error: unknown): string | null {
  const cause = error instanceof DrizzleQueryError ? error.cause : error;
  return cause instanceof postgres.PostgresError && cause.code === '23505' ? (cause.constraint_name ?? '') : null;
}
