import { mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { type Client, createClient } from '@libsql/client';
import { drizzle, type LibSQLDatabase } from 'drizzle-orm/libsql';
import * as schema from './schema';
import { type DatabaseLocation, databaseLocation, isLocalFile } from './url';

export type Db = LibSQLDatabase<typeof schema>;

export interface DatabaseHandle {
  client: Client;
  db: Db;
  /**
   * Runs one writing task at a time: overlapping write transactions in one process meet SQLITE_BUSY.
   * Prepare slow work (hashing, parsing, fitting) before, and only write inside.
   */
  write<T>(task: (db: Db) => Promise<T>): Promise<T>;
  close(): void;
}

const BUSY_TIMEOUT_MS = 5000;

/** Opens a database. Local files get WAL; foreign keys are checked to be on. */
export async function openDatabase(location: DatabaseLocation = databaseLocation()): Promise<DatabaseHandle> {
  if (isLocalFile(location.url)) mkdirSync(dirname(localPath(location.url)), { recursive: true });
  const client = createClient({ url: location.url, authToken: location.authToken, timeout: BUSY_TIMEOUT_MS });
  if (isLocalFile(location.url)) await client.execute('PRAGMA journal_mode = WAL');
  const foreignKeys = await client.execute('PRAGMA foreign_keys');
  if (Number(foreignKeys.rows[0]?.[0]) !== 1) throw new Error('The database does not enforce foreign keys.');
  const db = drizzle(client, { schema });
  let tail: Promise<unknown> = Promise.resolve();
  const write = <T>(task: (db: Db) => Promise<T>): Promise<T> => {
    const run = tail.then(() => runWrite(client, db, task));
    tail = run.catch(() => undefined);
    return run;
  };
  return { client, db, write, close: () => client.close() };
}

// After one SQLITE_BUSY the connection stays broken; reconnecting drops only this queue's (failed) transaction.
async function runWrite<T>(client: Client, db: Db, task: (db: Db) => Promise<T>): Promise<T> {
  try {
    return await task(db);
  } catch (error) {
    if (isBusy(error)) await client.reconnect();
    throw error;
  }
}

export function isBusy(error: unknown): boolean {
  const text =
    error instanceof Error ? `${error.message} ${String((error.cause as Error | undefined)?.message ?? '')}` : '';
  return text.includes('SQLITE_BUSY') || text.includes('database is locked');
}

function localPath(url: string): string {
  return url.startsWith('file:///') ? fileURLToPath(url) : url.slice('file:'.length);
}
