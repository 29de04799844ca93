/** Child processes and paths for the plain Node launchers. No dependency: these files run before the install. */
import { spawn } from 'node:child_process';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

export const ROOT = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

const KILL_AFTER_MS = 10_000;
const PARENT_POLL_MS = 500;

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
 * A run over `timeoutMs` is ended and answers `timedOut`. A launcher that is told to stop tells its child, and ends with it.
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
  const forwarding = forwardSignals(child);
  const watchdog = watch(child, options.timeoutMs);
  let stdout = '';
  child.stdout?.on('data', (chunk) => {
    stdout += chunk;
  });
  return new Promise((resolve, reject) => {
    const settle = (/** @type {() => void} */ done) => {
      forwarding.stop();
      watchdog.clear();
      if (forwarding.signal()) process.exit(exitCode(null, forwarding.signal()));
      done();
    };
    child.once('error', (error) => settle(() => reject(error)));
    child.once('close', (code, signal) =>
      settle(() => resolve({ code: exitCode(code, signal), stdout, timedOut: watchdog.fired() })),
    );
  });
}

/** Passes SIGINT and SIGTERM on to a child and leaves the ending to it. `signal` is the one that came, if any. */
export function forwardSignals(/** @type {import('node:child_process').ChildProcess} */ child) {
  /** @type {NodeJS.Signals | null} */
  let came = null;
  const pass = (/** @type {NodeJS.Signals} */ signal) => {
    came = signal;
    child.kill(signal);
  };
  process.on('SIGINT', pass).on('SIGTERM', pass);
  return { signal: () => came, stop: () => process.off('SIGINT', pass).off('SIGTERM', pass) };
}

/**
 * Ends this launcher when the npm that started it is gone: npm passes a SIGTERM to the shell between them, which dies of it
 * without telling anybody, and the server would go on alone.
 */
export function endWithNpm() {
  if (!process.env.npm_lifecycle_event) return;
  const parent = process.ppid;
  const check = () => process.ppid !== parent && process.kill(process.pid, 'SIGTERM');
  setInterval(check, PARENT_POLL_MS).unref();
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
