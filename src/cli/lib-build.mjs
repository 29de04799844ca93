/** Builds the server when its sources changed. The stamp in dist/ is the hash of everything the build reads. */
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { childEnv, isAlive, ROOT, run, say } from './lib-process.mjs';

const BUILD_INPUTS = ['src', 'public', 'astro.config.mjs', 'tsconfig.json', 'package-lock.json'];
// The launchers and commands run from source and are in no page.
const NOT_BUILT = ['src/cli'];
const ENTRY = 'dist/server/entry.mjs';
const STAMP = 'dist/.build-stamp';
const LOCK = 'node_modules/.cache/slipband-build.lock';
const LOCK_POLL_MS = 500;

/**
 * Hash over names and contents of files, so that an edit, a new file and a renamed file all change it.
 * @param {string} root
 * @param {readonly string[]} inputs files and folders relative to root; missing ones count as empty
 * @param {readonly string[]} [except] files and folders left out
 */
export function hashInputs(root, inputs, except = []) {
  const hash = createHash('sha256');
  for (const path of inputs.flatMap((input) => listFiles(root, input, except)).sort()) {
    hash.update(`${path}\0`).update(
      createHash('sha256')
        .update(readFileSync(join(root, path)))
        .digest(),
    );
  }
  return hash.digest('hex');
}

/** @returns {string[]} */
function listFiles(/** @type {string} */ root, /** @type {string} */ path, /** @type {readonly string[]} */ except) {
  if (except.includes(path)) return [];
  const stat = statSync(join(root, path), { throwIfNoEntry: false });
  if (!stat) return [];
  if (!stat.isDirectory()) return [path];
  return readdirSync(join(root, path)).flatMap((name) => listFiles(root, `${path}/${name}`, except));
}

/** Builds unless the stamp says that the build is of these sources. Answers the exit code of the build. */
export async function ensureBuilt() {
  if (isBuilt()) return 0;
  const unlock = await lockBuild();
  try {
    return isBuilt() ? 0 : await build();
  } finally {
    unlock();
  }
}

function currentHash() {
  return hashInputs(ROOT, BUILD_INPUTS, NOT_BUILT);
}

function isBuilt() {
  const stamp = join(ROOT, STAMP);
  return existsSync(join(ROOT, ENTRY)) && existsSync(stamp) && readFileSync(stamp, 'utf8') === currentHash();
}

async function build() {
  say('Building the server ...');
  const hash = currentHash();
  rmSync(join(ROOT, STAMP), { force: true });
  // The build must not depend on how the server will be run: production is what ships.
  const env = childEnv({ NODE_ENV: 'production' });
  const args = [join(ROOT, 'node_modules/astro/astro.js'), 'build'];
  const { code, stdout } = await run(process.execPath, args, { env, capture: true });
  if (code === 0) writeFileSync(join(ROOT, STAMP), hash);
  else say(`${stdout}\nThe build failed; see the messages above.`);
  return code;
}

// Two launchers at once (a server and a test run) must not write dist/ together.
async function lockBuild() {
  const path = join(ROOT, LOCK);
  mkdirSync(dirname(path), { recursive: true });
  while (!tryLock(path)) await wait(LOCK_POLL_MS);
  return () => rmSync(path, { force: true });
}

function tryLock(/** @type {string} */ path) {
  try {
    writeFileSync(path, String(process.pid), { flag: 'wx' });
    return true;
  } catch {
    if (!isAlive(Number(readFileSync(path, { encoding: 'utf8', flag: 'a+' })))) rmSync(path, { force: true });
    return false;
  }
}
