import { type DatabaseHandle, openDatabase } from '@/db/client';
import { migrateDatabase } from '@/db/migrate';
import { endExpiredSessions } from './auth/lucia';

let handle: DatabaseHandle | null = null;
let starting: Promise<DatabaseHandle> | null = null;

/** Opens and migrates the one database of this process. Awaited by the middleware module before the first answer. */
export function startRuntime(): Promise<DatabaseHandle> {
  starting ??= openMigrated();
  return starting;
}

async function openMigrated(): Promise<DatabaseHandle> {
  const opened = await openDatabase();
  await migrateDatabase(opened);
  await endExpiredSessions(opened);
  handle = opened;
  return opened;
}

export function database(): DatabaseHandle {
  if (!handle) throw new Error('The database is not open yet.');
  return handle;
}

/** Tests hand in a database of their own. */
export function setDatabase(other: DatabaseHandle): void {
  handle = other;
  starting = Promise.resolve(other);
}

/** Lets a write in flight finish, then closes. For an orderly stop. */
export async function stopRuntime(): Promise<void> {
  await handle?.write(async () => undefined);
  handle?.close();
  handle = null;
  starting = null;
}
