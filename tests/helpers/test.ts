/** The browser test of this project: it fails on anything a page complains about, unless the test said so before. */
import { AxeBuilder } from '@axe-core/playwright';
import { type BrowserContext, type BrowserContextOptions, test as base, expect, type Page } from '@playwright/test';
import { DEMO_PEOPLE } from '@/demo/team';
import type { Role } from '@/lib/domain/permissions';
import { type Owner, type Person, signInDemo, signUpOwner } from './people';

interface Complaints {
  /** A complaint the test brings about on purpose, e.g. the console's note of a refused form. */
  allow(pattern: RegExp): void;
  /** What came so far. */
  found(): readonly string[];
  /** Listens to another browser context as well. */
  watch(context: BrowserContext): void;
}

interface TestFixtures {
  complaints: Complaints;
  /** A page of somebody's own browser, closed with the test. */
  open: (person: Pick<Person, 'state'>, options?: BrowserContextOptions) => Promise<Page>;
  /** A team that nobody else has, and its owner. */
  owner: () => Promise<Owner>;
}

interface WorkerFixtures {
  /** A demo person, signed in once for all tests: the limit on tries is not theirs to meet. */
  demo: (role: Role) => Promise<Person>;
  /** The owner of a team that all tests of a worker may read, and none may change. */
  sharedOwner: Owner;
}

export const test = base.extend<TestFixtures, WorkerFixtures>({
  demo: [
    // biome-ignore lint/correctness/noEmptyPattern: Playwright reads the fixtures from the pattern
    async ({}, use, { project }) => {
      const known = new Map<Role, Promise<Person>>();
      const origin = project.use.baseURL ?? '';
      await use((role) => {
        const person = known.get(role) ?? signInDemo(origin, role);
        known.set(role, person);
        return person;
      });
      for (const person of known.values()) await (await person).api.request.dispose();
    },
    { scope: 'worker' },
  ],
  sharedOwner: [
    // biome-ignore lint/correctness/noEmptyPattern: Playwright reads the fixtures from the pattern
    async ({}, use, { project }) => {
      const owner = await signUpOwner(project.use.baseURL ?? '');
      await use(owner);
      await owner.api.request.dispose();
    },
    { scope: 'worker' },
  ],
  owner: async ({ baseURL }, use) => {
    const made: Owner[] = [];
    await use(async () => {
      const owner = await signUpOwner(baseURL ?? '');
      made.push(owner);
      return owner;
    });
    for (const { api } of made) await api.request.dispose();
  },
  open: async ({ browser, complaints }, use) => {
    const contexts: BrowserContext[] = [];
    await use(async ({ state }, options) => {
      const context = await browser.newContext({ ...options, storageState: state });
      contexts.push(context);
      complaints.watch(context);
      return context.newPage();
    });
    for (const context of contexts) await context.close();
  },
  complaints: [
    async ({ context }, use) => {
      const found: string[] = [];
      const allowed: RegExp[] = [];
      const watch = (watched: BrowserContext) => collectComplaints(watched, found);
      watch(context);
      await use({ allow: (pattern) => allowed.push(pattern), found: () => found, watch });
      const unexpected = found.filter((text) => !allowed.some((pattern) => pattern.test(text)));
      expect(unexpected, 'console errors, script errors and 5xx answers').toEqual([]);
    },
    { auto: true },
  ],
});

export { DEMO_PEOPLE, expect };

/** Somebody who is not signed in. */
export const NOBODY: Pick<Person, 'state'> = { state: { cookies: [], origins: [] } };

export const PHONE = { width: 390, height: 844 };

// Violations of the content security policy come as console errors too.
function collectComplaints(context: BrowserContext, found: string[]): void {
  context.on('console', (message) => {
    if (message.type() === 'error') found.push(`console: ${message.text()} (${message.location().url})`);
  });
  context.on('weberror', (webError) => found.push(`script: ${webError.error().message}`));
  context.on('response', (response) => {
    if (response.status() >= 500) found.push(`answer: ${response.status()} ${response.url()}`);
  });
}

/** Finds no breach of WCAG 2.2 A or AA that a program can see. */
export async function expectAccessible(page: Page): Promise<void> {
  await expectNoViolation(new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']));
}

/** The one thing that changes with the color scheme: the contrast of text. */
export async function expectReadable(page: Page): Promise<void> {
  await expectNoViolation(new AxeBuilder({ page }).withRules('color-contrast'));
}

async function expectNoViolation(axe: AxeBuilder): Promise<void> {
  const { violations } = await axe.analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(' ')).join(', ')}`);
  expect(found, 'axe violations').toEqual([]);
}

/** Finds nothing wider than the screen: no page scrolls sideways. */
export async function expectNoSidewaysScroll(page: Page): Promise<void> {
  const beyond = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
  expect(beyond, `pixels beyond the screen at ${page.url()}`).toBeLessThanOrEqual(0);
}

/** Waits until every part in sight is alive: what is pressed before that is an ordinary form. */
export async function expectAlive(page: Page): Promise<void> {
  await expect(page.locator('astro-island[ssr]')).toHaveCount(0);
}

/** Signs in through the form as the demo person of a role and waits for the page after it. */
export async function signIn(page: Page, role: Role): Promise<void> {
  const person = DEMO_PEOPLE.find((candidate) => candidate.role === role);
  if (!person) throw new Error(`The demo has no ${role}.`);
  await signInAs(page, person);
}

/** Signs in through the form and waits for the page after it. */
export async function signInAs(page: Page, { email, password }: { email: string; password: string }): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('Email').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}
