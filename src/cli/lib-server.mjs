/** Runs the built server: a free port, a database that is ready, a child that answers. */
import { spawn } from 'node:child_process';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { childEnv, forwardSignals, ROOT, run, stopChild, tsxArgs } from './lib-process.mjs';

export const DEFAULT_PORT = 4321;
export const DEFAULT_HOST = '127.0.0.1';

// The build is the production one whoever runs it: so is React's, which is faster and does not talk.
const SERVER_ENV = { NODE_ENV: 'production', ASTRO_NODE_LOGGING: 'disabled' };
const PORTS_TO_TRY = 20;
const HEALTH_TIMEOUT_MS = 60_000;
const HEALTH_POLL_MS = 100;

/**
 * Whether nobody listens on this port. Asks the system by listening for a moment.
 * @param {number} port
 * @param {string} host
 * @returns {Promise<boolean>}
 */
export function isPortFree(port, host) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen(port, host, () => probe.close(() => resolve(true)));
  });
}

/**
 * The port to serve on, or null when there is none: a port that was asked for is taken as it is or not at all,
 * without one the first free port from `first` on.
 * @param {{ asked: number | null, first: number, isFree: (port: number) => Promise<boolean> }} choice
 */
export async function pickPort({ asked, first, isFree }) {
  if (asked !== null) return (await isFree(asked)) ? asked : null;
  for (let port = first; port < first + PORTS_TO_TRY; port += 1) if (await isFree(port)) return port;
  return null;
}

/**
 * Reads a PORT setting: null when unset, an error message when it is no port.
 * @param {string | undefined} text
 * @returns {{ port: number | null } | { problem: string }}
 */
export function parsePort(text) {
  if (text === undefined || text === '') return { port: null };
  const port = Number(text);
  if (Number.isInteger(port) && port > 0 && port < 65_536) return { port };
  return { problem: `PORT is "${text}", which is no port. Use a whole number from 1 to 65535, for example PORT=4400.` };
}

/** Every-interface addresses are no address to call: use the loopback one. */
export function callableHost(/** @type {string} */ host) {
  if (host === '0.0.0.0' || host === '127.0.0.1') return '127.0.0.1';
  if (host === '::' || host === '::1') return '[::1]';
  return host.includes(':') ? `[${host}]` : host;
}

/**
 * Brings the database up to date; an empty local one outside production gets the demo season.
 * @param {string} databaseUrl
 * @param {Record<string, string | undefined>} [extraEnv]
 * @returns {Promise<{ seeded: boolean, people: { name: string, email: string, role: string, password: string }[] }>}
 */
export async function prepareDatabase(databaseUrl, extraEnv = {}) {
  const env = childEnv({ ...extraEnv, DATABASE_URL: databaseUrl });
  const { code, stdout } = await run(process.execPath, tsxArgs('src/cli/prepare-db.ts'), { env, capture: true });
  if (code !== 0) throw new Error('The database is not ready; see the message above.');
  return JSON.parse(stdout);
}

/**
 * Starts the built server and waits until it answers. Rejects when it ends or stays silent. Signals go on to it.
 * @param {{ port: number, host?: string, env?: Record<string, string | undefined> }} options
 */
export async function startServer({ port, host = DEFAULT_HOST, env = {} }) {
  const child = spawn(process.execPath, [join(ROOT, 'dist/server/entry.mjs')], {
    cwd: ROOT,
    env: /** @type {NodeJS.ProcessEnv} */ (childEnv({ ...SERVER_ENV, ...env, PORT: String(port), HOST: host })),
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  forwardSignals(child);
  try {
    await answersHealth(`http://${callableHost(host)}:${port}`, child);
    return child;
  } catch (error) {
    await stopChild(child);
    throw error;
  }
}

async function answersHealth(
  /** @type {string} */ origin,
  /** @type {import('node:child_process').ChildProcess} */ child,
) {
  const giveUpAt = Date.now() + HEALTH_TIMEOUT_MS;
  while (Date.now() < giveUpAt) {
    if (child.exitCode !== null || child.signalCode !== null) throw new Error('The server ended before it answered.');
    if (await isHealthy(origin)) return;
    await wait(HEALTH_POLL_MS);
  }
  throw new Error(`The server did not answer ${origin}/api/health within ${HEALTH_TIMEOUT_MS / 1000} seconds.`);
}

/** Whether a Slipband server answers there. */
export async function isHealthy(/** @type {string} */ origin) {
  try {
    const answer = await fetch(`${origin}/api/health`, { signal: AbortSignal.timeout(2000) });
    await answer.arrayBuffer();
    return answer.ok;
  } catch {
    return false;
  }
}
