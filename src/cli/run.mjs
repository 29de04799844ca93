/** `npm run NAME -- args`: makes sure the packages are there, then runs src/cli/NAME.ts. Only the command writes to stdout. */
import { ensureInstalled } from './lib-install.mjs';
import { childEnv, endWithNpm, run, say, tsxArgs } from './lib-process.mjs';

const COMMANDS = ['replay', 'suggest', 'bench', 'evaluate', 'screenshots'];

const [name = '', ...args] = process.argv.slice(2);

if (!COMMANDS.includes(name)) {
  say(`There is no command "${name}". The commands are: ${COMMANDS.join(', ')}.`);
  process.exit(1);
}

endWithNpm();
await ensureInstalled();
// npm starts scripts in the project folder; file names on the command line mean the folder npm was called from.
const calledByNpm = process.env.npm_lifecycle_event === name;
const cwd = (calledByNpm && process.env.INIT_CWD) || process.cwd();
const { code } = await run(process.execPath, tsxArgs(`src/cli/${name}.ts`, args), { cwd, env: childEnv() });
process.exit(code);
