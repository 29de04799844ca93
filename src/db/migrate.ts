import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { migrate } from 'drizzle-orm/libsql/migrator';
import { runAsScript } from './cli';
import { type DatabaseHandle, openDatabase } from './client';
import { databaseLocation, isLocalFile } from './url';

/**
 * Applies the committed migrations that are missing, then checks a local file: a migration that left orphans or a damaged file
 * must stop the start, not surface during a round.
 */
export async function migrateDatabase(handle: DatabaseHandle): Promise<void> {
  await handle.write(async (db) => {
    await migrate(db, { migrationsFolder: migrationsFolder() });
  });
  if (handle.client.protocol === 'file') await checkFile(handle);
}

async function checkFile({ client }: DatabaseHandle): Promise<void> {
  const orphans = await client.execute('PRAGMA foreign_key_check');
  if (orphans.rows.length > 0) throw new Error(`The database has ${orphans.rows.length} rows that point at nothing.`);
  const integrity = await client.execute('PRAGMA integrity_check');
  const verdict = String(integrity.rows[0]?.[0]);
  if (verdict !== 'ok') throw new Error(`The database file is damaged: ${verdict}. Restore a backup.`);
}

/** ./drizzle beside the working directory, or above this module: it runs from the source tree and from the built server. */
export function migrationsFolder(): string {
  const found = [process.cwd(), ...ancestors(dirname(fileURLToPath(import.meta.url)))]
    .map((folder) => join(folder, 'drizzle'))
    .find((folder) => existsSync(join(folder, 'meta', '_journal.json')));
  if (!found) throw new Error('The migrations folder "drizzle" is missing. It belongs beside the built server.');
  return found;
}

function ancestors(folder: string): string[] {
  const parent = dirname(folder);
  return parent === folder ? [folder] : [folder, ...ancestors(parent)];
}

async function main(): Promise<void> {
  const location = databaseLocation();
  const handle = await openDatabase(location);
  try {
    await migrateDatabase(handle);
    console.log(`The database is up to date (${isLocalFile(location.url) ? location.url : 'remote'}).`);
  } finally {
    handle.close();
  }
}

runAsScript('migrate', import.meta.url, main);
