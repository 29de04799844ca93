/** The browser test of this project: it fails on anything the page complains about, unless the test said so before. */
import { AxeBuilder } from '@axe-core/playwright';
import { type BrowserContext, test as base, expect, type Page } from '@playwright/test';

interface Complaints {
  /** A complaint the test brings about on purpose, e.g. the console's note of a refused form. */
  allow(pattern: RegExp): void;
}

export const test = base.extend<{ complaints: Complaints }>({
  complaints: [
    async ({ context }, use) => {
      const found: string[] = [];
      const allowed: RegExp[] = [];
      collectComplaints(context, found);
      await use({ allow: (pattern) => allowed.push(pattern) });
      const unexpected = found.filter((text) => !allowed.some((pattern) => pattern.test(text)));
      expect(unexpected, 'console errors, script errors and 5xx answers').toEqual([]);
    },
    { auto: true },
  ],
});

export { expect };

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
