/** A note beside the database file: which server has it open. Two servers must not write one file. */
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, isAbsolute, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { isAlive, ROOT } from './lib-process.mjs';
import { isHealthy } from './lib-server.mjs';

/**
 * Path of the note for a local database, null for a remote one (whose server does its own locking).
 * @param {string} databaseUrl
 */
export function notePath(databaseUrl) {
  if (!databaseUrl.startsWith('file:')) return null;
  const path = databaseUrl.startsWith('file://') ? fileURLToPath(databaseUrl) : databaseUrl.slice('file:'.length);
  return `${isAbsolute(path) ? path : join(ROOT, path)}.server.json`;
}

/** The address of the server that has this database open, or null. A note left by a dead process does not count. */
export async function runningServer(/** @type {string} */ databaseUrl) {
  const note = readNote(notePath(databaseUrl));
  if (!note || !isAlive(note.pid)) return null;
  return (await isHealthy(note.origin)) ? note.origin : null;
}

/** Leaves the note. Returns the function that takes it away. */
export function noteRunning(/** @type {string} */ databaseUrl, /** @type {{ pid: number, origin: string }} */ note) {
  const path = notePath(databaseUrl);
  if (!path) return () => {};
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(path, JSON.stringify(note));
  return () => rmSync(path, { force: true });
}

/** @returns {{ pid: number, origin: string } | null} */
function readNote(/** @type {string | null} */ path) {
  if (!path) return null;
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return null;
  }
}
