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
  /** Opens a page whose address is not known before (the newest suggestion), or brings it into the wanted state. */
  prepare?: (page: Page) => Promise<void>;
}

export interface Person {
  name: string;
  email: string;
  role: string;
  password: string;
}

const PHONE = { width: 390, height: 844 };
const DESK = { width: 1280, height: 900 };

/** The pictures of the README. Add a page here and it is shot with the rest. */
export const README_SHOTS: readonly Shot[] = [
  { name: 'conditions-phone', path: '/conditions', role: 'tuner', ...PHONE, dark: false, fullPage: false },
  {
    name: 'suggestion-desk',
    path: '/suggestions',
    role: 'crew_chief',
    ...DESK,
    dark: false,
    fullPage: true,
    prepare: openFirst(/^\/suggestions\/[^/]+$/),
  },
  { name: 'sheet-phone', path: '/sheet', role: 'driver', ...PHONE, dark: true, fullPage: false },
];

/** Every page at phone and desk width, light and dark: for our own reviews. */
export function reviewShots(paths: readonly string[], role: string | null): Shot[] {
  const looks = [PHONE, DESK].flatMap((size) => [false, true].map((dark) => ({ ...size, dark })));
  return paths.flatMap((path) =>
    looks.map((look) => ({
      name: `${fileName(path)}-${role ?? 'nobody'}-${look.width}-${look.dark ? 'dark' : 'light'}`,
      path,
      role,
      ...look,
      fullPage: true,
    })),
  );
}

const fileName = (path: string) => path.slice(1).replaceAll(/[^\w]+/g, '_') || 'home';

function openFirst(pattern: RegExp) {
  return async (page: Page) => {
    const link = (await linksOf(page)).find((path) => pattern.test(path));
    if (link) await page.goto(link, { waitUntil: 'networkidle' });
  };
}

/** Paths on this host that the page links to. */
async function linksOf(page: Page): Promise<string[]> {
  const hrefs = await page
    .locator('a[href]')
    .evaluateAll((links) => links.map((link) => (link as HTMLAnchorElement).href));
  const here = new URL(page.url()).origin;
  return hrefs.map((href) => new URL(href)).flatMap((url) => (url.origin === here ? [url.pathname] : []));
}

/** One address for each page file that links lead to from the start page, and the page files that none leads to. */
export async function findPages(page: Page): Promise<{ paths: string[]; unreached: string[] }> {
  const routes = pageRoutes();
  const found = new Map<string, string>();
  const queue = ['/', ...routes.filter((route) => !route.includes('['))];
  for (let path = queue.shift(); path !== undefined; path = queue.shift()) {
    const route = routes.find((candidate) => matches(candidate, path));
    if (!route || found.has(route)) continue;
    const answer = await page.goto(path, { waitUntil: 'domcontentloaded' }).catch(() => null);
    if (!answer?.headers()['content-type']?.startsWith('text/html')) continue;
    found.set(route, path);
    queue.push(...(await linksOf(page)));
  }
  return { paths: [...found.values()], unreached: routes.filter((route) => !found.has(route)) };
}

/** Route patterns of the page files, those without parameters first. */
function pageRoutes(): string[] {
  const files = readdirSync(join(ROOT, 'src/pages'), { recursive: true, encoding: 'utf8' });
  const routes = files
    .filter((file) => file.endsWith('.astro') && !/(^|\/)_/.test(file))
    .map((file) => `/${file.replace(/\.astro$/, '').replace(/(^|\/)index$/, '')}`);
  return routes.sort((a, b) => Number(a.includes('[')) - Number(b.includes('[')) || a.localeCompare(b));
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
  const path = join(folder, `${shot.name}.png`);
  await page.screenshot({ path, fullPage: shot.fullPage, animations: 'disabled' });
  return path;
}
