/** Where the browser of the tests and screenshots is. Nothing is downloaded: the packed Chromium comes with the packages. */
import { execFile } from 'node:child_process';
import { existsSync } from 'node:fs';
import { mkdir, mkdtemp, rename, rm, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { promisify } from 'node:util';
import { ROOT } from './lib-process.mjs';

export interface ChromiumLaunch {
  executablePath?: string;
  args: string[];
  env?: Record<string, string>;
}

const PACKED_VERSION = '143.0.4';
const UNPACKED = join(ROOT, `node_modules/.cache/slipband-chromium-${PACKED_VERSION}`);
const ON_PATH = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];

// Not the package's own flags: they switch web security off, which these tests are there to check.
const ARGS = ['--disable-gpu', '--font-render-hinting=none'];

/** Launch options for Playwright: CHROMIUM_PATH, else the packed one, else one on the PATH, else Playwright's own. */
export async function findChromium(): Promise<ChromiumLaunch> {
  const chosen = process.env.CHROMIUM_PATH;
  if (chosen) return { executablePath: chosen, args: ARGS };
  if (process.platform === 'linux' && process.arch === 'x64') return packedChromium();
  const found = ON_PATH.flatMap((name) => (process.env.PATH ?? '').split(':').map((dir) => join(dir, name)));
  const executablePath = found.find((path) => existsSync(path));
  return executablePath ? { executablePath, args: ARGS } : { args: ARGS };
}

async function packedChromium(): Promise<ChromiumLaunch> {
  if (!existsSync(UNPACKED)) await unpack();
  const executablePath = join(UNPACKED, 'chromium');
  return { executablePath, args: ARGS, env: await libraryEnv(executablePath) };
}

// Unpacked beside and moved into place in one step, so that two runs at once never see half of it.
async function unpack(): Promise<void> {
  await mkdir(dirname(UNPACKED), { recursive: true });
  const folder = await mkdtemp(`${UNPACKED}-`);
  await withEnv({ TMPDIR: folder, AWS_LAMBDA_JS_RUNTIME: 'nodejs20.x' }, async () => {
    const { default: packed } = await import('@sparticuz/chromium');
    await packed.executablePath();
  });
  await writeFile(join(folder, 'fonts/fonts.conf'), fontsConf(join(UNPACKED, 'fonts')));
  await rename(folder, UNPACKED).catch(() => rm(folder, { recursive: true, force: true }));
}

// The package unpacks into the temporary folder, and its libraries only where it believes to be in its usual cloud.
async function withEnv(values: Record<string, string>, task: () => Promise<void>): Promise<void> {
  const before = { ...process.env };
  Object.assign(process.env, values);
  try {
    await task();
  } finally {
    for (const name of Object.keys(process.env)) if (!(name in before)) delete process.env[name];
    Object.assign(process.env, before);
  }
}

/** A bare Debian lacks the NSS libraries and has no fonts; the package brings both. */
async function libraryEnv(executablePath: string): Promise<Record<string, string> | undefined> {
  const extra: Record<string, string> = {};
  if (await lacksLibraries(executablePath)) extra.LD_LIBRARY_PATH = join(UNPACKED, 'al2023/lib');
  if (!existsSync('/etc/fonts/fonts.conf')) extra.FONTCONFIG_PATH = join(UNPACKED, 'fonts');
  if (Object.keys(extra).length === 0) return undefined;
  return { ...(process.env as Record<string, string>), ...extra };
}

async function lacksLibraries(executablePath: string): Promise<boolean> {
  const ldd = promisify(execFile)('ldd', [executablePath]);
  return ldd.then(
    ({ stdout }) => stdout.includes('not found'),
    () => true,
  );
}

function fontsConf(folder: string): string {
  return `<?xml version="1.0"?>
<!DOCTYPE fontconfig SYSTEM "fonts.dtd">
<fontconfig><dir>${folder}</dir><cachedir>${folder}/cache</cachedir></fontconfig>
`;
}
