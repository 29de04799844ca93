/** The browser test of this project: it fails on anything the page complains about, unless the test said so before. */
import { AxeBuilder } from '@axe-core/playwright';
import { type BrowserContext, test as base, expect, type Page } from '@playwright/test';
import { DEMO_PEOPLE } from '@/demo/team';
import type { Role } from '@/lib/domain/permissions';

interface Complaints {
  /** A complaint the test brings about on purpose, e.g. the console's note of a refused form. */
  allow(pattern: RegExp): void;
  /** What came so far. */
  found(): readonly string[];
}

export const test = base.extend<{ complaints: Complaints }>({
  complaints: [
    async ({ context }, use) => {
      const found: string[] = [];
      const allowed: RegExp[] = [];
      collectComplaints(context, found);
      await use({ allow: (pattern) => allowed.push(pattern), found: () => found });
      const unexpected = found.filter((text) => !allowed.some((pattern) => pattern.test(text)));
      expect(unexpected, 'console errors, script errors and 5xx answers').toEqual([]);
    },
    { auto: true },
  ],
});

export { DEMO_PEOPLE, expect };

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
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
    .analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(' ')).join(', ')}`);
  expect(found, 'axe violations').toEqual([]);
}

/** Signs in through the form as the demo person of a role and waits for the page after it. */
export async function signIn(page: Page, role: Role): Promise<void> {
  const person = DEMO_PEOPLE.find((candidate) => candidate.role === role);
  if (!person) throw new Error(`The demo has no ${role}.`);
  await page.goto('/sign-in');
  await page.getByLabel('Email').fill(person.email);
  await page.getByLabel('Password').fill(person.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}
