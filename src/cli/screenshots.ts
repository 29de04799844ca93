/** `npm run screenshots`: pictures of the built server on a throw-away database with the demo season. */
import { mkdirSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { parseArgs } from 'node:util';
import { type Browser, chromium, type Page } from '@playwright/test';
import { ensureBuilt } from './lib-build.mjs';
import { findChromium } from './lib-chromium';
import { startOnFreshDatabase } from './lib-fresh.mjs';
import { ROOT, say, stopChild } from './lib-process.mjs';
import { isPortFree, pickPort } from './lib-server.mjs';
import {
  fillSuggestions,
  findPages,
  openPage,
  type Person,
  README_SHOTS,
  reviewShots,
  type Shot,
  shoot,
} from './lib-shots';

const USAGE = `npm run screenshots                                  the README's pictures, into fixtures/screenshots
npm run screenshots -- --all --out DIR [--role ROLE] [--only TEXT]
                                                     every page that ROLE (default owner; "nobody") can reach,
                                                     at 390 and 1280 px, light and dark; --only: paths with TEXT`;
const FIRST_PORT = 4500;

interface Options {
  all: boolean;
  out: string;
  role: string;
  only: string;
}

function readOptions(): Options {
  const { values } = parseArgs({
    options: {
      all: { type: 'boolean', default: false },
      out: { type: 'string' },
      role: { type: 'string', default: 'owner' },
      only: { type: 'string', default: '' },
      help: { type: 'boolean', default: false },
    },
  });
  if (values.help || (values.all && !values.out)) throw new Error(USAGE);
  const out = values.out ? resolve(values.out) : join(ROOT, 'fixtures/screenshots');
  return { all: values.all, role: values.role, only: values.only, out };
}

async function main(options: Options): Promise<void> {
  if ((await ensureBuilt()) !== 0) throw new Error('Nothing was shot, because the build failed.');
  const port = await pickPort({ asked: null, first: FIRST_PORT, isFree: (p) => isPortFree(p, '127.0.0.1') });
  if (port === null) throw new Error(`No free port from ${FIRST_PORT} on.`);
  const { child, people, origin } = await startOnFreshDatabase(port);
  try {
    mkdirSync(options.out, { recursive: true });
    await shootWith({ people, origin, out: options.out }, options);
  } finally {
    await stopChild(child);
  }
}

async function shootWith(served: Omit<Session, 'browser'>, options: Options): Promise<void> {
  const browser = await chromium.launch(await findChromium());
  try {
    const session = { ...served, browser };
    await (options.all ? shootAll(session, options) : shootInOrder(session, README_SHOTS));
  } finally {
    await browser.close();
  }
}

interface Session {
  browser: Browser;
  origin: string;
  people: readonly Person[];
  out: string;
}

async function shootAll(session: Session, { role: wanted, only }: Options): Promise<void> {
  const role = wanted === 'nobody' ? null : wanted;
  const chief = await openPage(session.browser, session.origin, personOf(session, 'crew_chief'));
  await fillSuggestions(chief);
  await chief.context().close();
  const page = await openPage(session.browser, session.origin, personOf(session, role));
  const { pages, unreached } = await findPages(page);
  await page.context().close();
  if (unreached.length > 0) say(`No link led to: ${unreached.join(', ')}`);
  const chosen = pages.filter((found) => found.path.includes(only) || found.route.includes(only));
  await shootInOrder(session, reviewShots(chosen, role));
}

async function shootInOrder(session: Session, shots: readonly Shot[]): Promise<void> {
  const open = new Map<string | null, Page>();
  for (const shot of shots) {
    const { role } = shot;
    const page = open.get(role) ?? (await openPage(session.browser, session.origin, personOf(session, role)));
    open.set(role, page);
    say(await shoot(page, shot, session.out));
  }
}

function personOf({ people }: Session, role: string | null): Person | null {
  if (role === null) return null;
  const person = people.find((candidate) => candidate.role === role);
  if (person) return person;
  throw new Error(`There is no demo person with the role "${role}". Roles: ${people.map((p) => p.role).join(', ')}.`);
}

try {
  await main(readOptions());
} catch (error) {
  say(error instanceof Error ? error.message : String(error));
  process.exitCode = 1;
}
