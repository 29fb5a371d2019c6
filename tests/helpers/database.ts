import { randomBytes } from 'node:crypto';
import postgres from 'postgres';
import { afterAll, inject } from 'vitest';
import { type Connection, connect } from '@/lib/server/db/client';
import { TEMPLATE } from './machine-wide';

export interface TestDatabase {
  readonly name: string;
  /** As the application connects. */
  readonly url: string;
  /** As the migrations connect: owns the tables. */
  readonly ownerUrl: string;
}

const named = (url: string, name: string): string => url.replace('/NAME', `/${name}`);

async function asSuper(statement: string): Promise<void> {
  const sql = postgres(named(inject('ground').superUrl, 'postgres'), { max: 1, onnotice: () => {} });
  try {
    // Two workers cannot copy one template at the same moment; the later one tries again.
    for (let tries = 0; ; tries += 1) {
      try {
        await sql.unsafe(statement);
        return;
      } catch (error) {
        if (tries > 50 || !(error instanceof postgres.PostgresError) || error.code !== '55006') throw error;
        await new Promise((resolve) => setTimeout(resolve, 100));
      }
    }
  } finally {
    await sql.end();
  }
}

/** Takes a database away, whoever is connected to it. */
export function dropDatabase(name: string): Promise<void> {
  return asSuper(`drop database if exists ${name} with (force)`);
}

/** A migrated, empty database of this test file's own; dropped when the file ends. */
export async function testDatabase(): Promise<TestDatabase> {
  const name = `t_${process.env.VITEST_POOL_ID ?? '0'}_${randomBytes(5).toString('hex')}`;
  await asSuper(`create database ${name} template ${TEMPLATE} owner nineover_owner`);
  const { appUrl, ownerUrl } = inject('ground');
  afterAll(() => dropDatabase(name));
  return { name, url: named(appUrl, name), ownerUrl: named(ownerUrl, name) };
}

/** The application's own kind of connection to a test database, closed when the file ends. */
export function connectTo(database: TestDatabase): Connection {
  const connection = connect(database.url, { max: 4 });
  afterAll(() => connection.close());
  return connection;
}
