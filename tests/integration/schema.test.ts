import { execFileSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { connectTo, type TestDatabase, testDatabase } from '@tests/helpers/database';
import postgres, { type Sql } from 'postgres';
import { v7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROOT } from '@/cli/local/places';
import { type Database, schema } from '@/lib/server/db/client';
import { scoped } from '@/lib/server/db/scope';

/** Not of one workshop: whom they belong to is a person or nobody. */
const GLOBAL_TABLES = ['credential', 'person', 'rate_limit', 'session', 'workshop'];
/** Indexes that must be found before a workshop is known, each with the reason. */
const INDEXES_ACROSS: Record<string, string> = {
  invitation_token: 'who opens a link has only its token',
  membership_by_person: 'who signs in has only themself',
};

let database: TestDatabase;
let owner: Sql;
let db: Database;

beforeAll(async () => {
  database = await testDatabase();
  owner = postgres(database.ownerUrl, { max: 1, onnotice: () => {} });
  db = connectTo(database).db;
});
afterAll(() => owner.end());

async function tables(): Promise<string[]> {
  const rows = await owner<{ name: string }[]>`
    select relname as name from pg_class where relkind = 'r' and relnamespace = 'public'::regnamespace order by 1`;
  return rows.map(({ name }) => name);
}

async function tenantTables(): Promise<string[]> {
  return (await tables()).filter((name) => !GLOBAL_TABLES.includes(name));
}

describe('the wall in the database', () => {
  it('stands, forced, around every table but the counted attempts', async () => {
    const rows = await owner<{ name: string }[]>`
      select relname as name from pg_class
      where relkind = 'r' and relnamespace = 'public'::regnamespace and not (relrowsecurity and relforcerowsecurity)`;
    expect(rows.map(({ name }) => name)).toEqual(['rate_limit']);
  });

  it('has workshop_id in every tenant table, first in every key and index', async () => {
    const names = await tenantTables();
    expect(names).toContain('reading');
    for (const name of names) {
      const columns = await owner`
        select is_nullable from information_schema.columns where table_name = ${name} and column_name = 'workshop_id'`;
      expect(columns[0]?.is_nullable, name).toBe('NO');
    }
    const indexes = await owner<{ table: string; index: string; first: string }[]>`
      select t.relname as "table", i.relname as index, a.attname as first
      from pg_index x join pg_class t on t.oid = x.indrelid join pg_class i on i.oid = x.indexrelid
      join pg_attribute a on a.attrelid = t.oid and a.attnum = x.indkey[0]
      where t.relname = any(${names})`;
    const elsewhere = indexes.filter(({ first }) => first !== 'workshop_id').map(({ index }) => index);
    expect(elsewhere.sort()).toEqual(Object.keys(INDEXES_ACROSS).sort());
  });

  it('lets the application own nothing, and change or delete no reading, step or file', async () => {
    const owned = await owner`select relname from pg_class where relowner = 'nineover_app'::regrole`;
    expect(owned).toHaveLength(0);
    const rights = await owner<{ table: string; right: string }[]>`
      select table_name as "table", privilege_type as "right" from information_schema.role_table_grants
      where grantee = 'nineover_app'`;
    const has = (table: string): string[] =>
      rights
        .filter((one) => one.table === table)
        .map((one) => one.right)
        .sort();
    for (const table of ['reading', 'run_step', 'run_file']) expect(has(table), table).toEqual(['INSERT', 'SELECT']);
    expect(rights.filter(({ right }) => right === 'TRUNCATE')).toEqual([]);
    await expect(db.execute('delete from reading')).rejects.toThrow();
    await expect(db.execute("update reading set result = '0'")).rejects.toThrow();
    await expect(db.execute('update run_step set times = 2')).rejects.toThrow();
  });

  it('shows nothing outside a workshop, and nothing of another one', async () => {
    const [ours, theirs, person] = [v7(), v7(), v7()];
    await scoped(
      { workshop: ours, person },
      async (tx) => {
        await tx.insert(schema.workshop).values({ id: ours, name: 'Ours' });
        await tx.insert(schema.person).values({ id: person, name: 'One', email: 'one@example.org' });
        await tx.insert(schema.membership).values({ workshopId: ours, personId: person, role: 'lead' });
        await tx.insert(schema.machine).values({ workshopId: ours, name: 'Heron', createdBy: person });
      },
      db,
    );
    const names = (workshop?: string): Promise<{ name: string }[]> =>
      scoped({ workshop }, (tx) => tx.select({ name: schema.machine.name }).from(schema.machine), db);
    expect(await names(ours)).toEqual([{ name: 'Heron' }]);
    expect(await names(theirs)).toEqual([]);
    expect(await names()).toEqual([]);
    // Nor can a row be put into another workshop, nor moved there.
    const smuggle = scoped(
      { workshop: theirs },
      (tx) => tx.insert(schema.machine).values({ workshopId: ours, name: 'Egret', createdBy: person }),
      db,
    );
    await expect(smuggle).rejects.toThrow();
    const move = scoped({ workshop: ours }, (tx) => tx.update(schema.machine).set({ workshopId: theirs }), db);
    await expect(move).rejects.toThrow();
  });

  it('forgets the scope with its transaction, also on the same connection', async () => {
    for (let round = 0; round < 8; round += 1)
      expect(await db.execute("select current_setting('nineover.workshop', true) as w")).toEqual(
        expect.arrayContaining([expect.objectContaining({ w: expect.toSatisfy((w: string | null) => !w) })]),
      );
  });
});

describe('migrations', () => {
  it('leave nothing of the schema unsaid', () => {
    // Inside the project, so that the tool finds its packages.
    const folder = mkdtempSync(path.join(os.tmpdir(), 'nineover-drift-'));
    try {
      cpSync(path.join(ROOT, 'drizzle'), folder, { recursive: true });
      const before = readdirSync(folder).length;
      const tool = path.join(ROOT, 'node_modules', 'drizzle-kit', 'bin.cjs');
      const schemaPath = './src/lib/server/db/schema';
      const args = [
        tool,
        'generate',
        '--dialect',
        'postgresql',
        '--schema',
        schemaPath,
        '--out',
        path.relative(ROOT, folder),
      ];
      const said = execFileSync(process.execPath, args, { cwd: ROOT, encoding: 'utf8' });
      expect(said).toContain('No schema changes');
      expect(readdirSync(folder)).toHaveLength(before);
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  });
});
