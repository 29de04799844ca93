/** Is what package-lock.json asks for installed? If not, `npm ci`. */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { childEnv, ROOT, run, say } from './lib-process.mjs';

export const OLDEST_NODE = Object.freeze({ major: 20, minor: 19 });

/**
 * Null when this Node is new enough, else a message that names the fix.
 * @param {string} version as process.versions.node
 */
export function nodeProblem(version) {
  const [major = 0, minor = 0] = version.split('.').map(Number);
  const enough = major > OLDEST_NODE.major || (major === OLDEST_NODE.major && minor >= OLDEST_NODE.minor);
  if (enough) return null;
  return `Slipband needs Node ${OLDEST_NODE.major}.${OLDEST_NODE.minor} or newer; this is ${version}. Install a newer Node and try again.`;
}

/**
 * Whether the tree npm recorded in node_modules is the one the lock file asks for.
 * Packages for other machine types are optional and may be absent.
 * @param {{ packages?: Record<string, LockEntry> }} lock package-lock.json
 * @param {{ packages?: Record<string, LockEntry> }} installed node_modules/.package-lock.json
 * @typedef {{ version?: string, integrity?: string, optional?: boolean }} LockEntry
 */
export function lockMatches(lock, installed) {
  const wanted = Object.entries(lock.packages ?? {}).filter(([path]) => path !== '');
  const have = installed.packages ?? {};
  const known = new Set(wanted.map(([path]) => path));
  const allKnown = Object.keys(have).every((path) => known.has(path));
  return allKnown && wanted.every(([path, entry]) => sameEntry(entry, have[path]));
}

function sameEntry(/** @type {LockEntry} */ wanted, /** @type {LockEntry | undefined} */ have) {
  if (!have) return wanted.optional === true;
  return wanted.version === have.version && wanted.integrity === have.integrity;
}

/** Installs what the lock file asks for, when it is not there yet. Ends the process with a message when that fails. */
export async function ensureInstalled() {
  stopOnOldNode();
  if (isInstalled()) return;
  say('Installing packages (npm ci); the first time takes a minute or two ...');
  const npm = process.platform === 'win32' ? 'npm.cmd' : 'npm';
  // The launcher, the build and the tests need the development packages also where NODE_ENV is production.
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
  const { code } = await run(npm, args, { env: childEnv(), toStderr: true });
  if (code === 0) return;
  say(
    'The packages could not be installed. Check the network and the messages above, then run the same command again.',
  );
  process.exit(1);
}

function stopOnOldNode() {
  const problem = nodeProblem(process.versions.node);
  if (!problem) return;
  say(problem);
  process.exit(1);
}

function isInstalled() {
  const recorded = join(ROOT, 'node_modules/.package-lock.json');
  if (!existsSync(recorded)) return false;
  return lockMatches(readJson(join(ROOT, 'package-lock.json')), readJson(recorded));
}

function readJson(/** @type {string} */ path) {
  return JSON.parse(readFileSync(path, 'utf8'));
}
