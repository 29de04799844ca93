/** `npm start`: from a fresh clone to a running server. Every step is skipped when there is nothing to do. */
import { ensureBuilt } from './lib-build.mjs';
import { ensureInstalled } from './lib-install.mjs';
import { endWithNpm, exitCode, say } from './lib-process.mjs';
import { noteRunning, runningServer } from './lib-running.mjs';
import {
  callableHost,
  DEFAULT_HOST,
  DEFAULT_PORT,
  isPortFree,
  parsePort,
  pickPort,
  prepareDatabase,
  startServer,
} from './lib-server.mjs';

const DEFAULT_DATABASE_URL = 'file:data/slipband.db'; // as in src/db/url.ts, which cannot be read before the install

const host = process.env.HOST || DEFAULT_HOST;
const databaseUrl = process.env.DATABASE_URL || DEFAULT_DATABASE_URL;

try {
  await main();
} catch (error) {
  stop(error instanceof Error ? error.message : String(error));
}

async function main() {
  endWithNpm();
  await ensureInstalled();
  const already = await runningServer(databaseUrl);
  if (already) return say(`Slipband is already running with this database at ${already}. Nothing was changed.`);
  const port = await choosePort();
  const buildCode = await ensureBuilt();
  if (buildCode !== 0) process.exit(buildCode);
  const { seeded, people } = await prepareDatabase(databaseUrl);
  if (seeded) say('The database was empty: the demo team and its season are in it now.');
  await serve(port, people);
}

async function choosePort() {
  const asked = parsePort(process.env.PORT);
  if ('problem' in asked) return stop(asked.problem);
  const choice = { asked: asked.port, first: DEFAULT_PORT, isFree: (/** @type {number} */ p) => isPortFree(p, host) };
  const port = await pickPort(choice);
  if (port === null) return stop(portTaken(asked.port));
  if (asked.port === null && port !== DEFAULT_PORT)
    say(`Port ${DEFAULT_PORT} is taken by another program: using ${port}.`);
  return port;
}

function portTaken(/** @type {number | null} */ asked) {
  const which = asked === null ? `Port ${DEFAULT_PORT} and the next ones are` : `Port ${asked} is`;
  return `${which} taken by another program. Stop it, or choose another port: PORT=4400 npm start`;
}

async function serve(
  /** @type {number} */ port,
  /** @type {{ email: string, role: string, password: string }[]} */ people,
) {
  const child = await startServer({ port, host });
  const removeNote = noteRunning(databaseUrl, { pid: process.pid, origin: `http://${callableHost(host)}:${port}` });
  child.once('exit', (code, signal) => {
    removeNote();
    process.exit(exitCode(code, signal));
  });
  announce(port, people);
}

function announce(
  /** @type {number} */ port,
  /** @type {{ email: string, role: string, password: string }[]} */ people,
) {
  const shown = callableHost(host) === '127.0.0.1' ? 'localhost' : callableHost(host);
  console.log(`\nSlipband is running at http://${shown}:${port}`);
  if (people.length > 0) console.log(`\nDemo sign-ins (invented people, local demo only):\n${signIns(people)}`);
  console.log('\nStop with Ctrl+C.');
}

function signIns(/** @type {{ email: string, role: string, password: string }[]} */ people) {
  const widest = Math.max(...people.map((person) => person.email.length));
  return people
    .map(({ role, email, password }) => `  ${role.padEnd(11)} ${email.padEnd(widest)}  ${password}`)
    .join('\n');
}

/** @returns {never} */
function stop(/** @type {string} */ message) {
  say(message);
  process.exit(1);
}
