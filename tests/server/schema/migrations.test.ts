import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { migrateDatabase, migrationsFolder } from '@/db/migrate';
import { emptyDatabase, unmigratedDatabase } from '../helpers';

const committedSql = () =>
  readdirSync(migrationsFolder())
    .filter((name) => name.endsWith('.sql'))
    .map((name) => readFileSync(join(migrationsFolder(), name), 'utf8'))
    .join('\n');

const count = async (handle: Awaited<ReturnType<typeof emptyDatabase>>, sql: string) =>
  Number((await handle.client.execute(sql)).rows[0]?.[0]);

describe('migrateDatabase', () => {
  it('builds an empty database with every table and trigger of the committed files', async () => {
    const handle = await unmigratedDatabase();
    await migrateDatabase(handle);
    const triggers = committedSql().match(/^CREATE TRIGGER/gm)?.length ?? 0;
    const tables = committedSql().match(/^CREATE TABLE/gm)?.length ?? 0;
    expect(triggers).toBeGreaterThan(0);
    expect(await count(handle, "SELECT count(*) FROM sqlite_master WHERE type = 'trigger'")).toBe(triggers);
    const own =
      "SELECT count(*) FROM sqlite_master WHERE type = 'table' AND name NOT LIKE '\\_\\_%' ESCAPE '\\' AND name NOT LIKE 'sqlite%'";
    expect(await count(handle, own)).toBe(tables);
  });

  it('keeps the text of a trigger whole', async () => {
    const handle = await emptyDatabase();
    const { rows } = await handle.client.execute("SELECT sql FROM sqlite_master WHERE name = 'pass_no_update'");
    expect(String(rows[0]?.sql)).toMatch(/BEGIN\s+SELECT RAISE\(ABORT, '.+'\);\s+END$/);
  });

  it('changes nothing the second time', async () => {
    const handle = await emptyDatabase();
    const before = await count(handle, 'SELECT count(*) FROM __drizzle_migrations');
    await migrateDatabase(handle);
    expect(await count(handle, 'SELECT count(*) FROM __drizzle_migrations')).toBe(before);
  });

  it('refuses a file with rows that point at nothing', async () => {
    const handle = await emptyDatabase();
    await handle.client.executeMultiple(
      "PRAGMA foreign_keys = OFF; INSERT INTO membership VALUES ('m', 'no team', 'no user', 'owner', 'now'); PRAGMA foreign_keys = ON;",
    );
    await expect(migrateDatabase(handle)).rejects.toThrow(/point at nothing/);
  });
});
