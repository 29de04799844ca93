/** Script each page of the built server loads, gzipped, by loading it in a browser as an owner. */
import { gzipSync } from 'node:zlib';
import { chromium, type Page } from '@playwright/test';
import type { Figure } from './lib-bench';
import { ensureBuilt } from './lib-build.mjs';
import { findChromium } from './lib-chromium';
import { startOnFreshDatabase } from './lib-fresh.mjs';
import { stopChild } from './lib-process.mjs';
import { isPortFree, pickPort } from './lib-server.mjs';
import { fillSuggestions, findPages, openPage } from './lib-shots';

const FIRST_PORT = 4560;
const GOAL_KB = 90;
const SHOWN = 3;

/** The heaviest pages. Charts load only where they are seen and are not counted here: a page is loaded and not scrolled. */
export async function benchScripts(): Promise<Figure[]> {
  if ((await ensureBuilt()) !== 0) throw new Error('The build failed.');
  const port = await pickPort({ asked: null, first: FIRST_PORT, isFree: (p) => isPortFree(p, '127.0.0.1') });
  if (port === null) throw new Error(`No free port from ${FIRST_PORT} on.`);
  const { child, people, origin } = await startOnFreshDatabase(port);
  const browser = await chromium.launch(await findChromium());
  try {
    const page = await openPage(browser, origin, people.find((p) => p.role === 'owner') ?? null);
    await fillSuggestions(page);
    const { pages } = await findPages(page);
    const sizes: { path: string; kb: number }[] = [];
    for (const { path } of pages) sizes.push({ path, kb: await scriptKb(page, `${origin}${path}`) });
    return sizes
      .sort((a, b) => b.kb - a.kb)
      .slice(0, SHOWN)
      .map(figureOf);
  } finally {
    await browser.close();
    await stopChild(child);
  }
}

const figureOf = ({ path, kb }: { path: string; kb: number }): Figure => ({
  name: `script of ${path}`,
  value: kb,
  unit: 'kB',
  goal: GOAL_KB,
  note: 'gzip, outside charts',
});

async function scriptKb(page: Page, url: string): Promise<number> {
  let bytes = 0;
  const reading: Promise<void>[] = [];
  const count = (response: import('@playwright/test').Response) => {
    if (response.request().resourceType() !== 'script') return;
    reading.push(
      response.body().then((body) => {
        bytes += gzipSync(body).byteLength;
      }),
    );
  };
  page.on('response', count);
  await page.goto(url, { waitUntil: 'networkidle' });
  page.off('response', count);
  await Promise.all(reading);
  return bytes / 1024;
}
