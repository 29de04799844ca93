import { logError } from './log';
import { database } from './runtime';

export interface Health {
  ok: boolean;
  database: 'ok' | 'unavailable';
}

/** Whether the process answers and its database does. Says nothing else: anybody may ask. */
export async function health(): Promise<Health> {
  try {
    await database().client.execute('SELECT 1 FROM team LIMIT 1');
    return { ok: true, database: 'ok' };
  } catch (error) {
    logError('the database does not answer', error, 'health');
    return { ok: false, database: 'unavailable' };
  }
}
