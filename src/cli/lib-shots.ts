/** Pictures of pages: what to shoot, and which pages there are. */
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser, Page } from '@playwright/test';
import { ROOT } from './lib-process.mjs';

export interface Shot {
  /** File name without ending. */
  name: string;
  path: string;
  /** Demo role to sign in as; null for nobody. */
  role: string | null;
  width: number;
  height: number;
  dark: boolean;
  /** The whole page, or what the screen shows at first. */
  fullPage: boolean;
  /** Opens a page whose address is not known before, or brings it into the wanted state. */
  prepare?: (page: Page) => Promise<void>;
  /** What later shots rest on. */
  after?: (page: Page) => Promise<void>;
}

export interface Person {
  name: string;
  email: string;
  role: string;
  password: string;
}

const PHONE = { width: 390, height: 844 };
const DESK = { width: 1280, height: 900 };

/** The pictures of the README, in working order: the driver's sheet is of the decision before it. Add a page and it is shot too. */
export const README_SHOTS: readonly Shot[] = [
  {
    name: 'conditions-phone',
    path: '/conditions',
    role: 'tuner',
    ...PHONE,
    dark: false,
    fullPage: false,
    prepare: fillConditions,
  },
  {
    name: 'suggestion-desk',
    path: '/suggestions/new',
    role: 'crew_chief',
    width: DESK.width,
    height: 1040,
    dark: false,
    fullPage: false,
    prepare: askForSuggestion,
    after: decideAndPublish,
  },
  { name: 'sheet-phone', path: '/sheet', role: 'driver', ...PHONE, dark: true, fullPage: false },
];

/** A page file's route and one address of it. */
export interface FoundPage {
  route: string;
  path: string;
}

/** Every page at phone and desk width, light and dark: for our own reviews. */
export function reviewShots(pages: readonly FoundPage[], role: string | null): Shot[] {
  const looks = [PHONE, DESK].flatMap((size) => [false, true].map((dark) => ({ ...size, dark })));
  return pages.flatMap(({ route, path }, i) => {
    const again = pages.slice(0, i).filter((page) => page.route === route).length;
    const name = `${fileName(route)}${again > 0 ? again + 1 : ''}-${role ?? 'nobody'}`;
    const nameOf = (look: { width: number; dark: boolean }) => `${name}-${look.width}-${look.dark ? 'dark' : 'light'}`;
    return looks.map((look) => ({ name: nameOf(look), path, role, ...look, fullPage: true }));
  });
}

const fileName = (route: string) => route.replaceAll(/[^\w]+/g, '_').replaceAll(/^_|_$/g, '') || 'home';

async function fillConditions(page: Page): Promise<void> {
  const typed = {
    'Air temperature': '71.4',
    'Relative humidity': '24',
    Pressure: '28.63',
    'Track temperature': '98',
  };
  for (const [label, value] of Object.entries(typed)) await page.getByRole('textbox', { name: label }).fill(value);
  await page.evaluate(() => window.scrollTo(0, 0));
}

/** Asks for a suggestion as the page offers it, with an own estimate, and stays on the answer. */
async function askForSuggestion(page: Page): Promise<void> {
  await page.goto('/suggestions/new', { waitUntil: 'networkidle' });
  await page.getByLabel('Slip I expect').fill('15.5');
  await page.getByRole('button', { name: 'Ask, with my estimate' }).click();
  await page.waitForURL((url) => /^\/suggestions\/(?!new)/.test(url.pathname));
  await page.waitForLoadState('networkidle');
}

/** The demo has no suggestion yet: one that was decided, with its launch sheet, and one that waits. For a page of the crew chief. */
export async function fillSuggestions(page: Page): Promise<void> {
  await askForSuggestion(page);
  await decideAndPublish(page);
  await askForSuggestion(page);
}

/** Takes the first way to decide on the suggestion that is open, and publishes the launch sheet. */
async function decideAndPublish(page: Page): Promise<void> {
  await page.getByRole('radio').first().check();
  await page
    .getByRole('textbox', { name: 'Notes on the launch sheet' })
    .fill('Surface is cooling. Watch for a soft spot at the hit.');
  await page.getByRole('button', { name: 'Record the decision' }).click();
  await page.waitForURL((url) => url.hash === '#decided');
}

/** Paths on this host that the page links to. */
async function linksOf(page: Page): Promise<string[]> {
  const hrefs = await page
    .locator('a[href]')
    .evaluateAll((links) => links.map((link) => (link as HTMLAnchorElement).href));
  const here = new URL(page.url()).origin;
  return hrefs.map((href) => new URL(href)).flatMap((url) => (url.origin === here ? [url.pathname] : []));
}

// A suggestion looks different before and after the decision.
const ADDRESSES_KEPT: Record<string, number> = { '/suggestions/[id]': 2 };

/** Addresses for each page file that links lead to from the start page, and the page files that none leads to. */
export async function findPages(page: Page): Promise<{ pages: FoundPage[]; unreached: string[] }> {
  const routes = pageRoutes();
  const found: FoundPage[] = [];
  const seen = new Set<string>();
  const queue = ['/', ...routes.filter((route) => !route.includes('['))];
  for (let path = queue.shift(); path !== undefined; path = queue.shift()) {
    const route = routes.find((candidate) => matches(candidate, path));
    const enough = found.filter((page) => page.route === route).length >= (ADDRESSES_KEPT[route ?? ''] ?? 1);
    if (!route || enough || seen.has(path)) continue;
    seen.add(path);
    if (!(await opens(page, path))) continue;
    found.push({ route, path });
    queue.push(...(await linksOf(page)));
  }
  return { pages: found, unreached: routes.filter((route) => !found.some((page) => page.route === route)) };
}

async function opens(page: Page, path: string): Promise<boolean> {
  const answer = await page.goto(path, { waitUntil: 'domcontentloaded' }).catch(() => null);
  return answer?.headers()['content-type']?.startsWith('text/html') ?? false;
}

/** Route patterns of the page files, the most fixed first. */
function pageRoutes(): string[] {
  const files = readdirSync(join(ROOT, 'src/pages'), { recursive: true, encoding: 'utf8' });
  const routes = files
    .filter((file) => file.endsWith('.astro') && !/(^|\/)_/.test(file))
    .map((file) => `/${file.replace(/\.astro$/, '').replace(/(^|\/)index$/, '')}`);
  const parameters = (route: string) => route.split('[').length;
  return routes.sort((a, b) => parameters(a) - parameters(b) || a.localeCompare(b));
}

function matches(route: string, path: string): boolean {
  const source = route.replaceAll(/\[\.\.\.[^\]]+\]/g, '.*').replaceAll(/\[[^\]]+\]/g, '[^/]+');
  return new RegExp(`^${source}/?$`).test(path);
}

/** A page signed in as this person (or as nobody), ready to shoot. */
export async function openPage(browser: Browser, origin: string, person: Person | null): Promise<Page> {
  const context = await browser.newContext({ baseURL: origin, locale: 'en-US', reducedMotion: 'reduce' });
  const page = await context.newPage();
  if (person) await signIn(page, person);
  return page;
}

async function signIn(page: Page, { email, password }: Person): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('Email').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}

/** Shoots one page into a PNG. */
export async function shoot(page: Page, shot: Shot, folder: string): Promise<string> {
  await page.setViewportSize({ width: shot.width, height: shot.height });
  await page.emulateMedia({ colorScheme: shot.dark ? 'dark' : 'light', reducedMotion: 'reduce' });
  await page.goto(shot.path, { waitUntil: 'networkidle' });
  await shot.prepare?.(page);
  if (shot.fullPage) await growToPage(page, shot.width);
  const path = join(folder, `${shot.name}.png`);
  await page.screenshot({ path, fullPage: shot.fullPage, animations: 'disabled' });
  await shot.after?.(page);
  return path;
}

// A bar fixed to the lower edge belongs at the end of the picture, and what loads when seen has to be seen.
async function growToPage(page: Page, width: number): Promise<void> {
  const height = await page.evaluate(() => document.documentElement.scrollHeight);
  await page.setViewportSize({ width, height });
  await page.waitForLoadState('networkidle');
}
