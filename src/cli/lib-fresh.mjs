/** A server on a throw-away database with the demo season, for the browser tests and the screenshots. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { prepareDatabase, startServer } from './lib-server.mjs';

// The demo is refused in production; a throw-away database is none, whatever the caller's environment says.
const DEMO_ENV = { NODE_ENV: 'test', SLIPBAND_MODE: '' };

/** Needs a build. The database goes when the server ends. `people` are the demo sign-ins. */
export async function startOnFreshDatabase(/** @type {number} */ port) {
  const folder = mkdtempSync(join(tmpdir(), 'slipband-fresh-'));
  const removeFolder = () => rmSync(folder, { recursive: true, force: true });
  process.once('exit', removeFolder);
  const databaseUrl = `file:${join(folder, 'slipband.db')}`;
  const { people } = await prepareDatabase(databaseUrl, DEMO_ENV);
  const child = await startServer({ port, env: { DATABASE_URL: databaseUrl } });
  child.once('exit', removeFolder);
  return { child, people, origin: `http://localhost:${port}` };
}
