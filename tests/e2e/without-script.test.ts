import { readFileSync } from 'node:fs';
import { type Api, addRaceDay, type Car, type RaceDay, SMALL_FILE } from '../helpers/people';
import { expect, test } from '../helpers/test';

// The whole day on plain forms: a phone at the fence may have lost its script halfway.
const NO_SCRIPT = { javaScriptEnabled: false };
test.use(NO_SCRIPT);

test('somebody signs in, mistypes first, and signs out again', async ({ page, owner, complaints }) => {
  complaints.allow(/status of 401/);
  const person = await owner();
  await page.goto('/passes');
  await expect(page).toHaveURL(/\/sign-in\?next=/);
  await page.getByLabel('Email').fill(person.email);
  await page.getByLabel('Password').fill('not this one at all');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByRole('alert')).toContainText('The email address or the password is wrong.');
  await expect(page.getByLabel('Email')).toHaveValue(person.email);
  await page.getByLabel('Password').fill(person.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page).toHaveURL('/passes');
  await page.getByRole('button', { name: 'Sign out' }).click();
  await expect(page.getByText('You are signed out')).toBeVisible();
  await page.goto('/passes');
  await expect(page).toHaveURL(/\/sign-in/);
});

test('a reading, a suggestion and a decision become a launch sheet', async ({ owner, open }) => {
  const person = await owner();
  const day = await addRaceDay(person);
  const page = await open(person, NO_SCRIPT);
  await page.goto('/conditions');
  await page.getByLabel('Air temperature (°F)').fill('61');
  await page.getByLabel('Relative humidity (%)').fill('19');
  await page.getByLabel('Pressure (inHg)').fill('28,64');
  await page.getByLabel('Track temperature (°F)').fill('88.4');
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(page.getByRole('region', { name: 'Stored' })).toContainText('88.4 °F');
  await page.getByRole('link', { name: 'Go to suggestion' }).click();
  await expect(page.getByRole('button', { name: /one step/ })).toHaveCount(0);
  await page.getByLabel('Slip I expect').fill('15.2');
  await page.getByLabel('Launch rpm (rpm)').fill('7400');
  await page.getByRole('button', { name: 'Ask, with my estimate' }).click();
  await expect(page.getByText('88.4 °F', { exact: true })).toBeVisible();
  await expect(page.getByText(/20 equally likely outcomes/).first()).toBeVisible();

  const accept = page.getByRole('radio', { name: /^Accept/ }).first();
  await accept.check();
  await page.getByRole('button', { name: 'Record the decision' }).click();
  await expect(page.getByRole('heading', { name: /^Accepted: / })).toBeVisible();
  const accepted = await acceptedSettings(person.api, day, page.url());
  await page.getByRole('link', { name: 'Open launch sheet 1' }).click();
  const sheet = page.getByRole('article');
  await expect(sheet).toContainText('Version 1');
  const shown = await sheet.getByRole('definition').allTextContents();
  const values = shown.map((text) => Number.parseFloat(text.replaceAll(',', '')));
  expect(values.sort(ascending)).toEqual(accepted.sort(ascending));
});

test('settings that cannot be read are kept, asked back, and decided once they are clear', async ({
  owner,
  open,
  complaints,
}) => {
  complaints.allow(/status of 400/);
  const person = await owner();
  const { car, roundId, readingId } = await addRaceDay(person);
  const asked = await person.api.post<{ id: string }>('/api/suggestions', { carId: car.id, roundId, readingId });
  const page = await open(person, NO_SCRIPT);
  await page.goto(`/suggestions/${asked.id}`);
  await page.getByRole('radio', { name: /^Adjust/ }).check();
  const rpm = page.getByLabel('Launch rpm (rpm)');
  await rpm.fill('7,550');
  await page.getByRole('textbox', { name: 'Reason' }).fill('It felt lazy');
  await page.getByRole('button', { name: 'Record the decision' }).click();
  await expect(page.getByText('is 7,550 meant as 7550 or as 7.55?').first()).toBeVisible();
  await expect(rpm).toHaveAttribute('aria-invalid', 'true');
  await expect(rpm).toHaveValue('7,550');
  await expect(page.getByRole('textbox', { name: 'Reason' })).toHaveValue('It felt lazy');
  await rpm.fill('7550');
  await page.getByRole('button', { name: 'Record the decision' }).click();
  await expect(page.getByRole('heading', { name: /^Adjusted/ })).toBeVisible();
  await expect(page.getByText('“It felt lazy”')).toBeVisible();
  await expect(page.getByText('7,550 rpm').first()).toBeVisible();
});

test('a file is checked first and added in a second step', async ({ owner, open }) => {
  const person = await owner();
  const car = await person.api.post<Car>('/api/cars', { name: 'Talbray Two' });
  const page = await open(person, NO_SCRIPT);
  await page.goto('/passes/import');
  await page.getByLabel('CSV file').setInputFiles(SMALL_FILE);
  await page.getByRole('button', { name: 'Check the file' }).click();
  await expect(page.getByText('24 passes will be added.')).toBeVisible();
  const log = await person.api.get<{ total: number }>(`/api/passes?carId=${car.id}`);
  expect(log.total, 'nothing is stored yet').toBe(0);
  await page.getByLabel('The same CSV file again').setInputFiles(SMALL_FILE);
  await page.getByRole('button', { name: 'Add 24 passes' }).click();
  await expect(page.getByText('24 passes added.')).toBeVisible();
  await page.getByRole('link', { name: 'See the passes' }).click();
  await expect(page.getByText('24 passes. The band is 13 to 17 %.')).toBeVisible();
});

test('the log is sorted by its headings and filtered by a button, and the address says how', async ({
  owner,
  open,
}) => {
  const person = await owner();
  await addRaceDay(person, SMALL_FILE);
  const page = await open(person, NO_SCRIPT);
  await page.goto('/passes');
  await page.getByRole('columnheader', { name: 'Slip' }).getByRole('link').click();
  await expect(page).toHaveURL('/passes?sort=slipPct&dir=asc');
  const first = page.getByRole('table').getByRole('row').nth(1);
  await expect(first).toContainText('11.2 %');
  await page.getByText('Filter and sort').click();
  await page.getByLabel('Outcome').selectOption('Shake');
  await page.getByRole('button', { name: 'Show', exact: true }).click();
  await expect(page).toHaveURL(/outcome=shake/);
  await expect(page).toHaveURL(/sort=slipPct/);
  const outcomes = page.getByRole('table').getByRole('row').filter({ hasNotText: 'Outcome' });
  await expect(outcomes).toHaveCount(SHAKEN);
  await expect(outcomes.filter({ hasText: 'Shake' })).toHaveCount(SHAKEN);
});

const SHAKEN = readFileSync(SMALL_FILE, 'utf8').match(/,shake,/g)?.length ?? 0;

const ascending = (a: number, b: number): number => a - b;

async function acceptedSettings(api: Api, { car }: RaceDay, url: string): Promise<number[]> {
  const id = new URL(url).pathname.split('/').at(-1);
  const { result } = await api.get<{ result: { offers: { settings: Record<string, number> }[] } }>(
    `/api/suggestions/${id}`,
  );
  return car.adjustables.map(({ key }) => result.offers[0]?.settings[key] ?? Number.NaN);
}
