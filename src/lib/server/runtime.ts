import { type DatabaseHandle, openDatabase } from '@/db/client';

let handle: DatabaseHandle | null = null;

/** Opens the one database of this process. Called once by the middleware module before the first request is answered. */
export async function startRuntime(): Promise<DatabaseHandle> {
  handle ??= await openDatabase();
  return handle;
}

export function database(): DatabaseHandle {
  if (!handle) throw new Error('The database is not open yet.');
  return handle;
}
