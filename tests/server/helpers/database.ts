import { createHash, randomUUID } from 'node:crypto';
import { copyFileSync, existsSync, mkdtempSync, readdirSync, readFileSync, renameSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll } from 'vitest';
import { type DatabaseHandle, openDatabase } from '@/db/client';
import { migrateDatabase, migrationsFolder } from '@/db/migrate';

/** Real files, never ":memory:". One migrated base file is made per set of migrations and copied for each database. */
const open: { handle: DatabaseHandle; folder: string }[] = [];

afterAll(() => {
  for (const { handle, folder } of open.splice(0)) {
    handle.close();
    rmSync(folder, { recursive: true, force: true });
  }
});

/** An empty, migrated database of its own, removed after the test file. */
export async function emptyDatabase(): Promise<DatabaseHandle> {
  const base = await baseFile();
  const folder = mkdtempSync(join(tmpdir(), 'slipband-test-'));
  const path = join(folder, 'test.db');
  copyFileSync(base, path);
  return remember(await openDatabase({ url: `file:${path}`, authToken: undefined }), folder);
}

/** A database without any migration, for the tests of the migrations themselves. */
export async function unmigratedDatabase(): Promise<DatabaseHandle> {
  const folder = mkdtempSync(join(tmpdir(), 'slipband-test-'));
  return remember(await openDatabase({ url: `file:${join(folder, 'test.db')}`, authToken: undefined }), folder);
}

function remember(handle: DatabaseHandle, folder: string): DatabaseHandle {
  open.push({ handle, folder });
  return handle;
}

async function baseFile(): Promise<string> {
  const base = join(tmpdir(), `slipband-test-base-${migrationsHash()}.db`);
  if (existsSync(base)) return base;
  const fresh = `${base}.${randomUUID()}`;
  const handle = await openDatabase({ url: `file:${fresh}`, authToken: undefined });
  await migrateDatabase(handle);
  await handle.client.execute('PRAGMA wal_checkpoint(TRUNCATE)');
  await handle.client.execute('PRAGMA journal_mode = DELETE');
  handle.close();
  // Workers may race here: each renames a whole file into place.
  renameSync(fresh, base);
  return base;
}

function migrationsHash(): string {
  const hash = createHash('sha256');
  const folder = migrationsFolder();
  for (const name of readdirSync(folder).filter((file) => file.endsWith('.sql'))) {
    hash.update(name).update(readFileSync(join(folder, name)));
  }
  return hash
    .update(readFileSync(join(folder, 'meta', '_journal.json')))
    .digest('hex')
    .slice(0, 16);
}
