import { readFileSync } from 'node:fs';
import type { Page } from '@playwright/test';
import { expect, expectAccessible, expectAlive, signIn, test } from '../helpers/test';

const SAMPLE = readFileSync('fixtures/passes/sample-small.csv', 'utf8');

/** The sample as passes nobody has: other numbers, another year. */
function freshFile(firstNo: number, spoil: (line: string, index: number) => string = (line) => line): string {
  const [header = '', ...lines] = SAMPLE.trim().split(/\r?\n/).slice(0, 7);
  const fresh = lines.map((line, i) =>
    spoil(line.replace(/^\d+/, String(firstNo + i)).replaceAll('2026-', '2024-'), i),
  );
  return [header, ...fresh].join('\n');
}

async function chooseFile(page: Page, text: string): Promise<void> {
  await page.locator('#file').setInputFiles({ name: 'season.csv', mimeType: 'text/csv', buffer: Buffer.from(text) });
}

test('the table sorts and filters in place, and the address brings it back', async ({ page }) => {
  await signIn(page, 'tuner');
  await page.goto('/passes');
  await expectAccessible(page);
  const slips = async () => {
    const texts = await page.locator('.cell-slip strong').allTextContents();
    return texts.filter((text) => text !== '—').map((text) => Number(text.split(' ')[0]));
  };
  await page.getByRole('table').getByRole('link', { name: 'Slip' }).click();
  await expect(page.getByRole('columnheader', { name: 'Slip' })).toHaveAttribute('aria-sort', 'ascending');
  const rising = (values: number[]) => values.length > 10 && values.every((value, i) => value >= (values[i - 1] ?? 0));
  await expect.poll(async () => rising(await slips())).toBe(true);

  await page.getByText('Filter and sort').click();
  await page.getByLabel('Outcome').selectOption('smoke');
  await expect(page).toHaveURL(/outcome=smoke/);
  await expect(page.locator('.cell-outcome').first()).toContainText('Smoke');
  await page.reload();
  await expect(page.getByLabel('Outcome')).toHaveValue('smoke');
  await expect(page.getByRole('columnheader', { name: 'Slip' })).toHaveAttribute('aria-sort', 'ascending');
  await page.goBack();
  await expect(page.getByLabel('Outcome')).toHaveValue('');
});

test('on a phone each pass is a card that opens the pass', async ({ page }) => {
  await page.setViewportSize({ width: 390, height: 844 });
  await signIn(page, 'driver');
  await page.goto('/passes?settings=1');
  await expectAccessible(page);
  const wider = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
  expect(wider).toBe(0);
  await page
    .getByRole('link', { name: /^Pass \d+/ })
    .first()
    .click();
  await expect(page.getByRole('heading', { name: 'Settings' })).toBeVisible();
  await expect(page.getByRole('link', { name: 'Correct' })).toHaveCount(0);
  await expectAccessible(page);
});

test.describe('without script', () => {
  test.use({ javaScriptEnabled: false });

  test('a pass is logged, corrected, left out and counts again, each with its reason', async ({ page, complaints }) => {
    complaints.allow(/status of 400/);
    await signIn(page, 'tuner');
    await page.goto('/passes/new');
    await page.getByRole('radio', { name: 'Shake' }).check({ force: true });
    await page.getByLabel('Slip (%)').fill('12,x');
    await page.getByLabel('Time at the track').fill('2026-01-15T12:34');
    await page.getByRole('button', { name: 'Save the pass' }).click();
    await expect(page.getByRole('alert')).toContainText('Slip must be a plain number');
    await expect(page.getByRole('radio', { name: 'Shake' })).toBeChecked();
    await page.getByLabel('Slip (%)').fill('12,4');
    await page.getByRole('button', { name: 'Save the pass' }).click();
    await expect(page.getByText('12.4 %')).toBeVisible();
    await expect(page.getByText('Logged by hand')).toBeVisible();

    await page.getByRole('link', { name: 'Correct', exact: true }).click();
    await page.getByLabel('Slip (%)').fill('14.4');
    await page.getByLabel('Why is it corrected?').fill('Read the wrong channel');
    await page.getByRole('button', { name: 'Save correction' }).click();
    await expect(page.getByText('Slip from 12.4 % to 14.4 %')).toBeVisible();

    await page.getByText('Leave this pass out').click();
    await page.getByRole('button', { name: 'Leave it out' }).click();
    await expect(page.getByRole('alert')).toContainText('reason');
    await page.getByLabel('Why does it not count?').fill('Water on the track');
    await page.getByRole('button', { name: 'Leave it out' }).click();
    await expect(page.getByText('Left out of the model').first()).toBeVisible();
    await page.getByText('Let it count again').click();
    await page.getByLabel('Why does it count after all?').fill('It was dry');
    await page.getByRole('button', { name: 'Let it count' }).click();
    await expect(page.getByText('Counts again')).toBeVisible();
  });

  test('a file is checked, then added with the file chosen again', async ({ page }) => {
    await signIn(page, 'tuner');
    await page.goto('/passes/import');
    await chooseFile(page, freshFile(8100));
    await page.getByRole('button', { name: 'Check the file' }).click();
    await expect(page.getByText('6 passes will be added.')).toBeVisible();
    await chooseFile(page, freshFile(8100));
    await page.getByRole('button', { name: 'Add 6 passes' }).click();
    await expect(page.getByText('6 passes added.')).toBeVisible();
    await chooseFile(page, freshFile(8100));
    await page.getByRole('button', { name: 'Check the file' }).click();
    await expect(page.getByText('6 passes are in your log already')).toBeVisible();
  });
});

test('a file with bad rows says which and why, and adds the good ones only when told to', async ({
  page,
  complaints,
}) => {
  complaints.allow(/status of 400/);
  await signIn(page, 'tuner');
  await page.goto('/passes/import');
  await expectAlive(page);
  await chooseFile(
    page,
    freshFile(8200, (line, i) => (i === 1 ? line.replace(',clean,', ',boom,') : line)),
  );
  await page.getByRole('button', { name: 'Check the file' }).click();
  const refused = page.getByRole('row', { name: /outcome/ });
  await expect(refused).toContainText('3');
  await expect(refused).toContainText('"boom" is not one of clean, shake, smoke, aborted');
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Add 5 passes' }).click();
  await expect(page.getByRole('alert')).toContainText('nothing was stored');
  await page.getByRole('checkbox').check();
  await page.getByRole('button', { name: 'Add 5 passes' }).click();
  await expect(page.getByText('5 passes added.')).toBeVisible();
});
