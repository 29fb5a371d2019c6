import { sql } from 'drizzle-orm';
import { type Database, database, type Tx } from './client';

/** What a transaction may see. Each field opens the rows that row-level security ties to it, and nothing else. */
export interface Scope {
  readonly workshop?: string | undefined;
  readonly person?: string | undefined;
  readonly session?: string | undefined;
  readonly email?: string | undefined;
  /** Hash of an invitation's token. */
  readonly invitation?: string | undefined;
}

const KEYS = ['workshop', 'person', 'session', 'email', 'invitation'] as const satisfies readonly (keyof Scope)[];

/**
 * Runs `work` in one transaction that sees what `scope` names. The settings are local to the transaction, so a pooled
 * connection carries nothing over to the next user. This is the only door to the tenant tables.
 */
export function scoped<T>(scope: Scope, work: (tx: Tx) => Promise<T>, db: Database = database()): Promise<T> {
  return db.transaction(async (tx) => {
    await widen(tx, scope);
    return work(tx);
  });
}

/** Adds to the scope of a transaction that is already open: a workshop made or a person found inside it. */
export async function widen(tx: Tx, scope: Scope): Promise<void> {
  const set = KEYS.filter((key) => scope[key] !== undefined).map(
    (key) => sql`set_config(${`nineover.${key}`}, ${scope[key]}, true)`,
  );
  if (set.length > 0) await tx.execute(sql`select ${sql.join(set, sql`, `)}`);
}
