import { gzipSync } from 'node:zlib';
import type { Page } from '@playwright/test';
import type { Owner } from '../helpers/people';
import { addressOf, type Ids, pageRoutes, teamWithEverything } from '../helpers/routes';
import {
  test as base,
  expect,
  expectAccessible,
  expectAlive,
  expectNoSidewaysScroll,
  expectReadable,
  NOBODY,
  PHONE,
} from '../helpers/test';

const SCRIPT_LIMIT_KB = 90;
/** Charts load when they are seen and are not counted. */
const CHART = /chart/i;
/** Read where signal is poor: the entry form has no framework, and the driver's sheet needs no script. */
const LESS_KB: Record<string, number> = {
  '/conditions': 20,
  '/conditions/[id]/correct': 20,
  '/sheet': 0,
  '/sheet/[id]': 0,
};
/** For somebody who is not signed in. */
const OUTSIDE = ['/sign-in', '/sign-up', '/403', '/404', '/500'];
/** The table without its filter is judged where the table is tested; 50 rows take a program long. */
const SHORTER: Record<string, string> = { '/passes': '/passes?outcome=smoke' };
/** What these answer with when they are opened on purpose. */
const STATUS: Record<string, number> = { '/403': 403, '/404': 404, '/500': 500 };

interface Everything {
  owner: Owner;
  ids: Ids;
}

const test = base.extend<object, { everything: Everything }>({
  everything: [
    async ({ sharedOwner }, use) => {
      await use({ owner: sharedOwner, ids: await teamWithEverything(sharedOwner) });
    },
    { scope: 'worker', timeout: 60_000 },
  ],
});

test.describe.configure({ mode: 'parallel' });

for (const route of pageRoutes()) {
  test(`${route} is light, readable by day and night, and fits a phone`, async ({ everything, open, complaints }) => {
    const person = OUTSIDE.includes(route) ? NOBODY : everything.owner;
    const page = await open(person, { viewport: PHONE, reducedMotion: 'reduce' });
    const script = countScript(page);
    if (STATUS[route]) complaints.allow(new RegExp(`status of ${STATUS[route]}|answer: ${STATUS[route]}`));
    const answer = await page.goto(SHORTER[route] ?? addressOf(route, everything.ids));
    expect(answer?.status()).toBe(STATUS[route] ?? 200);
    await wakeIslands(page);
    expect(await script()).toBeLessThanOrEqual(LESS_KB[route] ?? SCRIPT_LIMIT_KB);
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    const day = await paper(page);
    await page.emulateMedia({ colorScheme: 'dark' });
    expect(await paper(page), 'the night has its own paper').not.toBe(day);
    await expectReadable(page);
  });
}

test('a suggestion that was decided is as light and readable as an open one', async ({ everything, open }) => {
  const page = await open(everything.owner, { viewport: PHONE, reducedMotion: 'reduce' });
  const script = countScript(page);
  await page.goto('/suggestions');
  await page
    .getByRole('row', { name: /accepted/ })
    .getByRole('link')
    .first()
    .click();
  await expect(page.getByRole('heading', { name: /^Accepted/ })).toBeVisible();
  await wakeIslands(page);
  expect(await script()).toBeLessThanOrEqual(SCRIPT_LIMIT_KB);
  await expectNoSidewaysScroll(page);
  await expectAccessible(page);
});

const paper = (page: Page): Promise<string> =>
  page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);

/** Kilobytes of gzipped script since the call, with everything that the page loads when it is scrolled. */
function countScript(page: Page): () => Promise<number> {
  const sizes: Promise<number>[] = [];
  page.on('response', (response) => {
    if (response.request().resourceType() !== 'script' || CHART.test(response.url())) return;
    sizes.push(response.body().then((body) => gzipSync(body).byteLength));
  });
  return async () => (await Promise.all(sizes)).reduce((sum, bytes) => sum + bytes, 0) / 1024;
}

/** Opens and scrolls to every part that comes alive, until all have. */
async function wakeIslands(page: Page): Promise<void> {
  const adjust = page.getByRole('radio', { name: /^Adjust/ });
  if ((await adjust.count()) > 0) await adjust.check();
  for (const island of await page.locator('astro-island').all())
    await island.locator('xpath=..').scrollIntoViewIfNeeded();
  await expectAlive(page);
}
