/** Child processes and paths for the plain Node launchers. No dependency: these files run before the install. */
import { spawn } from 'node:child_process';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

export const ROOT = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

const KILL_AFTER_MS = 10_000;

/** Messages of the launchers go to stderr, so that the stdout of a command stays clean. */
export function say(/** @type {string} */ message) {
  process.stderr.write(`${message}\n`);
}

/** Arguments for `node` that run a TypeScript file of this project, whatever the working directory. */
export function tsxArgs(/** @type {string} */ file, /** @type {readonly string[]} */ args = []) {
  const loader = pathToFileURL(join(ROOT, 'node_modules/tsx/dist/loader.mjs')).href;
  return ['--import', loader, join(ROOT, file), ...args];
}

/** Environment for children: the path aliases of tsconfig.json hold from any working directory; no Astro telemetry. */
export function childEnv(/** @type {Record<string, string | undefined>} */ extra = {}) {
  return {
    ...process.env,
    TSX_TSCONFIG_PATH: join(ROOT, 'tsconfig.json'),
    ASTRO_TELEMETRY_DISABLED: '1',
    ...extra,
  };
}

/**
 * Runs a program to its end. `capture` collects stdout instead of showing it; `toStderr` shows stdout on stderr.
 * A run over `timeoutMs` is ended and answers `timedOut`.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {{ cwd?: string, env?: Record<string, string | undefined>, capture?: boolean, toStderr?: boolean, timeoutMs?: number }} [options]
 * @returns {Promise<{ code: number, stdout: string, timedOut: boolean }>}
 */
export function run(command, args, options = {}) {
  const child = spawn(command, args, {
    cwd: options.cwd ?? ROOT,
    env: /** @type {NodeJS.ProcessEnv} */ (options.env ?? childEnv()),
    stdio: ['inherit', stdoutOf(options), 'inherit'],
  });
  const stopForwarding = forwardSignals(child);
  const watchdog = watch(child, options.timeoutMs);
  let stdout = '';
  child.stdout?.on('data', (chunk) => {
    stdout += chunk;
  });
  return new Promise((resolve, reject) => {
    const settle = (/** @type {() => void} */ done) => {
      stopForwarding();
      watchdog.clear();
      done();
    };
    child.once('error', (error) => settle(() => reject(error)));
    child.once('close', (code, signal) =>
      settle(() => resolve({ code: exitCode(code, signal), stdout, timedOut: watchdog.fired() })),
    );
  });
}

/** Passes SIGINT and SIGTERM on to a child and leaves the ending to it. Returns the function that undoes this. */
export function forwardSignals(/** @type {import('node:child_process').ChildProcess} */ child) {
  const pairs = /** @type {const} */ (['SIGINT', 'SIGTERM']).map((signal) => {
    const listener = () => child.kill(signal);
    process.on(signal, listener);
    return /** @type {const} */ ([signal, listener]);
  });
  return () => {
    for (const [signal, listener] of pairs) process.off(signal, listener);
  };
}

/** Ends a child politely, by force when it does not follow; resolves when it has gone. */
export async function stopChild(/** @type {import('node:child_process').ChildProcess} */ child) {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const gone = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGTERM');
  const force = setTimeout(() => child.kill('SIGKILL'), KILL_AFTER_MS);
  await gone;
  clearTimeout(force);
}

/** Whether a process id is of a running process. */
export function isAlive(/** @type {number} */ pid) {
  if (!Number.isInteger(pid) || pid <= 0) return false;
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM';
  }
}

/** The exit code to pass on: 128 + number for the common signals, as a shell does. */
export function exitCode(/** @type {number | null} */ code, /** @type {string | null} */ signal) {
  if (code !== null) return code;
  return signal === 'SIGINT' ? 130 : 143;
}

function stdoutOf(/** @type {{ capture?: boolean, toStderr?: boolean }} */ { capture, toStderr }) {
  if (capture) return 'pipe';
  return toStderr ? 2 : 'inherit';
}

function watch(
  /** @type {import('node:child_process').ChildProcess} */ child,
  /** @type {number | undefined} */ timeoutMs,
) {
  let fired = false;
  const timer =
    timeoutMs === undefined
      ? undefined
      : setTimeout(() => {
          fired = true;
          void stopChild(child);
        }, timeoutMs);
  return { fired: () => fired, clear: () => clearTimeout(timer) };
}
