/** The server of the browser tests: the built one, on a fresh database with the demo season, gone when the tests are done. */
import { ensureBuilt } from '../../src/cli/lib-build.mjs';
import { startOnFreshDatabase } from '../../src/cli/lib-fresh.mjs';
import { say } from '../../src/cli/lib-process.mjs';

const port = Number(process.env.E2E_PORT ?? 4398);

if ((await ensureBuilt()) !== 0) process.exit(1);
const { child, origin } = await startOnFreshDatabase(port);
say(`Test server at ${origin}`);
child.once('exit', (code) => process.exit(code ?? 0));
