import { readFileSync } from 'node:fs';
import type { Page } from '@playwright/test';
import { addRaceDay, type Car, type Owner, pastSeason, SMALL_FILE } from '../helpers/people';
import { expect, expectAlive, test } from '../helpers/test';

test('what is exported comes back whole in another team, and twice adds nothing', async ({ owner, open }) => {
  const ours = await owner();
  const { car } = await addRaceDay(ours, SMALL_FILE);
  await leaveOutOne(ours, car);
  const page = await open(ours);
  const exported = await exportFile(page);
  expect(exported.name).toBe('passes-talbray-one.csv');
  expect(exported.text).toContain('"Oil, ""left"" lane, wiped"');

  await check(page, exported.text);
  await expect(page.getByText('Nothing will be added.')).toBeVisible();
  await expect(page.getByText('24 passes are in your log already')).toBeVisible();
  await expect(page.getByRole('button', { name: /^Add/ })).toHaveCount(0);

  const theirs = await owner();
  await theirs.api.post('/api/cars', { name: 'Talbray One' });
  const other = await open(theirs);
  await check(other, exported.text);
  await other.getByRole('button', { name: 'Add 24 passes' }).click();
  await expect(other.getByText('24 passes added.')).toBeVisible();
  await expect(other.getByRole('table')).toHaveCount(0);
  expect((await exportFile(other)).text).toBe(exported.text);
});

test('bad rows are named by row, column and reason; only a confirmed import keeps the good ones', async ({
  owner,
  open,
  complaints,
}) => {
  complaints.allow(/status of 400/);
  const person = await owner();
  const car = await person.api.post<Car>('/api/cars', { name: 'Talbray Three' });
  const page = await open(person);
  const file = spoiled({ 3: [',clean,', ',boom,'], 5: ['2024-02-13T10:33:00-07:00', 'last Friday'] });
  await check(page, file);
  await expect(page.getByText('22 passes will be added. 2 rows are refused.')).toBeVisible();
  const refused = page.getByRole('table').filter({ has: page.getByRole('columnheader', { name: 'Why' }) });
  await expect(refused.getByRole('row', { name: /^4 outcome/ })).toContainText('"boom" is not one of');
  await expect(refused.getByRole('row', { name: /^6 date_time/ })).toContainText('last Friday');

  await page.getByRole('button', { name: 'Add 22 passes' }).click();
  await expect(page.getByRole('alert')).toContainText('nothing was stored');
  expect(await passCount(person, car)).toBe(0);
  await page.getByRole('checkbox', { name: /^Add the 22 passes that can be read/ }).check();
  await page.getByRole('button', { name: 'Add 22 passes' }).click();
  await expect(page.getByText('22 passes added.')).toBeVisible();

  await check(page, file);
  await expect(page.getByText('22 passes are in your log already')).toBeVisible();
  await check(page, pastSeason(SMALL_FILE));
  await expect(page.getByText('2 passes will be added.')).toBeVisible();
  expect(await passCount(person, car)).toBe(22);
});

test('what is no pass file is refused in words, and nothing breaks', async ({ owner, open, complaints }) => {
  complaints.allow(/status of 400/);
  const person = await owner();
  await person.api.post('/api/cars', { name: 'Talbray Four' });
  const page = await open(person);
  for (const text of ['', '\u0000\u0001\u0002', 'a letter to nobody\nin two lines', '{"passes": []}']) {
    await check(page, text);
    await expect(page.getByRole('alert'), JSON.stringify(text)).toContainText('Nothing was added');
    await expect(page.getByRole('button', { name: /^Add/ })).toHaveCount(0);
  }
});

test('a reading entered with the file is what the pass shows, and a correction keeps both', async ({ owner, open }) => {
  const person = await owner();
  const { car } = await addRaceDay(person, SMALL_FILE);
  const page = await open(person);
  await page.goto('/passes?sort=passNo&dir=asc');
  await page.getByRole('table').getByRole('row', { name: /^1 / }).getByRole('link').first().click();
  await expect(page.getByRole('heading', { level: 1, name: 'Pass 1' })).toBeVisible();
  for (const shown of ['14.8 %', '63.0 °F', '88.0 °F', '7,450 rpm'])
    await expect(page.getByRole('main').getByText(shown, { exact: true }).first()).toBeVisible();
  const before = page.url();
  await page.getByRole('link', { name: 'Correct', exact: true }).click();
  await page.getByLabel('Slip (%)').fill('13.9');
  await page.getByLabel('Why is it corrected?').fill('Front wheels were up');
  await page.getByRole('button', { name: 'Save correction' }).click();
  const history = page.locator('section').filter({ has: page.getByRole('heading', { name: /^What happened/ }) });
  await expect(history).toContainText('Slip from 14.8 % to 13.9 %');
  await expect(history).toContainText('Front wheels were up');
  await expect(history).toContainText(/Wren Talbray/);
  await expect(page).toHaveURL(new RegExp(`^${before}`));
  expect(await passCount(person, car), 'a correction is no second pass').toBe(24);
});

async function check(page: Page, text: string): Promise<void> {
  await page.goto('/passes/import');
  await expectAlive(page);
  const buffer = Buffer.from(text);
  await page.getByLabel('CSV file').setInputFiles({ name: 'season.csv', mimeType: 'text/csv', buffer });
  await page.getByRole('button', { name: 'Check the file' }).click();
}

async function exportFile(page: Page): Promise<{ name: string; text: string }> {
  await page.goto('/passes');
  const download = page.waitForEvent('download');
  await page.getByRole('link', { name: 'Export' }).click();
  const file = await download;
  return { name: file.suggestedFilename(), text: readFileSync(await file.path(), 'utf8') };
}

/** The small file with something else in some of its rows, counted as a reader of the file does. */
function spoiled(changes: Record<number, readonly [string, string]>): string {
  const lines = pastSeason(SMALL_FILE).trim().split(/\r?\n/);
  return lines.map((line, i) => line.replace(...(changes[i] ?? ['', '']))).join('\n');
}

async function leaveOutOne({ api }: Owner, car: Car): Promise<void> {
  const { passes } = await api.get<{ passes: { id: string }[] }>(`/api/passes?carId=${car.id}`);
  await api.post(`/api/passes/${passes[3]?.id}/exclude`, { reason: 'Oil, "left" lane, wiped' });
}

const passCount = async ({ api }: Owner, car: Car): Promise<number> =>
  (await api.get<{ total: number }>(`/api/passes?carId=${car.id}`)).total;
