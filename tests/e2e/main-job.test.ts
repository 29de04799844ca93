import type { Locator, Page } from '@playwright/test';
import { CAUTIONS } from '@/components/site/cautions';
import { expectWholeForecast, readForecast } from '../helpers/forecast';
import type { Car, Person } from '../helpers/people';
import { expect, expectNoSidewaysScroll, PHONE, test } from '../helpers/test';

// The launch sheet of the demo car is one thing for all: only these tests publish one, one after the other.

test('the tuner reads the conditions at the fence, is asked about a slip and fixes it with one tap', async ({
  demo,
  open,
}) => {
  const page = await open(await demo('tuner'), { viewport: PHONE });
  await page.goto('/conditions');
  await expectNoSidewaysScroll(page);
  const air = page.getByRole('region', { name: 'The air' });
  // The form starts with the kinds of the reading before, which may be another test's.
  await page.getByRole('radio', { name: 'Relative' }).check();
  await page.getByRole('radio', { name: 'Station' }).check();
  await page.getByLabel('Air temperature (°F)').fill('95');
  await page.getByLabel('Relative humidity (%)').fill('16');
  await page.getByLabel('Pressure (inHg)').fill('28.65');
  await expect.poll(() => densityAltitudeFt(air)).toBeGreaterThan(3000);
  await page.getByLabel('Air temperature (°F)').fill('61');
  await expect.poll(() => densityAltitudeFt(air), 'cooler air is denser').toBeLessThan(2000);
  const before = await densityAltitudeFt(air);
  for (const label of ['Air density', 'Grains of water', 'Vapor pressure', 'Sun above horizon'])
    await expect(air.getByText(label)).toBeVisible();

  await page.getByLabel('Pressure (inHg)').fill('29.86');
  const trackTemp = page.getByLabel('Track temperature (°F)');
  await trackTemp.fill('88.5');
  await expect(page.getByText('That looks sea-level corrected')).toBeVisible();
  await page.getByRole('button', { name: 'It is an altimeter setting' }).click();
  await expect(page.getByText('That looks sea-level corrected')).toBeHidden();
  await expect.poll(() => densityAltitudeFt(air), 'the same air, given another way').toBeLessThan(before + 60);
  expect(await densityAltitudeFt(air)).toBeGreaterThan(before - 60);

  await page.getByRole('button', { name: 'Save', exact: true }).click();
  const stored = page.getByRole('region', { name: 'Stored' });
  await expect(stored).toContainText('88.5 °F');
  expect(Math.abs((await densityAltitudeFt(stored)) - before)).toBeLessThan(60);
  await stored.getByRole('link', { name: 'Go to suggestion' }).click();
  await expect(page).toHaveURL(/\/suggestions/);
});

test('the chief estimates, adjusts with the live forecast, and the driver sees exactly that', async ({
  demo,
  open,
  complaints,
}) => {
  complaints.allow(/status of 4(00|09)/);
  const reading = await freshReading(await demo('tuner'));
  const chief = await open(await demo('crew_chief'), { viewport: PHONE });
  await askWithEstimate(chief, reading);
  await expectSuggestion(chief);
  const second = await open(await demo('owner'));
  await second.goto(chief.url());

  const chosen = await adjust(chief, await demo('crew_chief'));
  await chief.getByRole('button', { name: 'Record the decision' }).click();
  await expect(reasonField(chief)).toHaveAttribute('aria-invalid', 'true');
  expect(await typedSettings(chief, await demo('crew_chief')), 'nothing lost').toEqual(chosen);
  await reasonField(chief).fill('The groove is tighter than the numbers say');
  await chief.getByLabel('Notes on the launch sheet').fill('Soft spot at the hit');
  await chief.getByRole('button', { name: 'Record the decision' }).click();
  await expect(chief.getByRole('heading', { name: /^Adjusted, starting from:/ })).toBeVisible();

  await second
    .getByRole('radio', { name: /^Accept/ })
    .first()
    .check();
  await second.getByRole('button', { name: 'Record the decision' }).click();
  await expect(second.getByRole('alert')).toContainText('Tess Arkwell has decided on this suggestion already');

  const driver = await open(await demo('driver'), { viewport: PHONE, javaScriptEnabled: false });
  await driver.goto('/sheet');
  await expectNoSidewaysScroll(driver);
  const sheet = driver.getByRole('article');
  expect(await sheetSettings(sheet)).toEqual(chosen);
  await expect(sheet).toContainText('Soft spot at the hit');
  for (const caution of CAUTIONS) await expect(sheet).toContainText(caution);
  await expect(driver.getByText('The odds behind this plan')).toHaveCount(0);
  await driver.getByRole('button', { name: /^I have seen version \d+$/ }).click();
  await expect(driver.getByText('You have seen this version')).toBeVisible();

  await chief.getByRole('link', { name: /^Open launch sheet \d+$/ }).click();
  await expect(chief.getByText(/Seen by Jun Castelow \(driver\) \d+:\d\d [AP]M/)).toBeVisible();
  await expect(chief.getByText('The odds behind this plan')).toBeVisible();
});

test('the chief declines with a reason, and the sheet says that nothing changes', async ({
  demo,
  open,
  complaints,
}) => {
  complaints.allow(/status of 400/);
  const chief = await open(await demo('crew_chief'));
  await askWithEstimate(chief, await freshReading(await demo('tuner')));
  const asTheyStand = await currentSettings(chief, await demo('crew_chief'));
  await chief.getByRole('radio', { name: /^Decline/ }).check();
  await chief.getByRole('button', { name: 'Record the decision' }).click();
  await expect(reasonField(chief)).toHaveAttribute('aria-invalid', 'true');
  await expect(chief.getByRole('radio', { name: /^Decline/ })).toBeChecked();
  await reasonField(chief).fill('No time left, the lane is drawn');
  await chief.getByRole('button', { name: 'Record the decision' }).click();
  await expect(chief.getByRole('heading', { name: 'Declined: run as it stands' })).toBeVisible();
  await expect(chief.getByText('No time left, the lane is drawn')).toBeVisible();

  const driver = await open(await demo('driver'), { javaScriptEnabled: false });
  await driver.goto('/sheet');
  await expect(driver.getByRole('heading', { name: 'Nothing changes' })).toBeVisible();
  expect(await sheetSettings(driver.getByRole('article'))).toEqual(asTheyStand);
});

async function densityAltitudeFt(slip: Locator): Promise<number> {
  const text = ((await slip.textContent()) ?? '').replaceAll(/\s+/g, ' ');
  return Number(/Density altitude ?(−?[\d,]+) ft/.exec(text)?.[1]?.replaceAll(',', '').replace('−', '-'));
}

const reasonField = (page: Page): Locator => page.getByRole('textbox', { name: 'Reason' });

/** The id of a new reading at the track of the open round, so that no other test's is taken for it. */
async function freshReading({ api }: Person): Promise<string> {
  const [newest] = await api.get<{ trackId: string }[]>('/api/readings?limit=1');
  return (await api.post<{ id: string }>('/api/readings', { trackId: newest?.trackId, ...FRESH })).id;
}

const FRESH = { airTempC: 16, relativeHumidity: 0.16, pressurePa: 97_000, pressureKind: 'station', trackTempC: 31.4 };

async function askWithEstimate(page: Page, readingId: string): Promise<void> {
  await page.goto('/suggestions');
  await page.getByRole('link', { name: 'Ask for a suggestion' }).click();
  await page.getByLabel('Reading of the conditions').selectOption(readingId);
  await page.getByLabel('Slip I expect').fill('15,5');
  await page.getByLabel('Most likely not below').fill('13.5');
  await page.getByLabel('Most likely not above').fill('18');
  await page.getByRole('button', { name: 'Ask, with my estimate' }).click();
  await expect(page.getByRole('heading', { name: 'Made from' })).toBeVisible();
  await expect(page.getByText('88.5 °F', { exact: true })).toBeVisible();
}

async function expectSuggestion(page: Page): Promise<void> {
  await expectNoSidewaysScroll(page);
  const cards = page.locator('section').filter({ has: page.getByRole('figure') });
  const offers = await cards.all();
  expect(offers.length).toBeGreaterThan(1);
  const passesUsed = new Set<number>();
  for (const offer of offers) passesUsed.add((await expectWholeForecast(offer)).passesUsed);
  expect([...passesUsed][0], 'passes used').toBeGreaterThan(100);
  expect(passesUsed.size).toBe(1);
  await expect(cards.filter({ hasText: 'No change: the car as it stands' })).toHaveCount(1);
  await expect(cards.first()).toContainText('Your call.');
  for (const caution of CAUTIONS) await expect(page.getByText(caution)).toBeVisible();
  const own = page.locator('section').filter({ has: page.getByRole('heading', { name: 'Own estimate' }) });
  await expect(own).toContainText('15.5 %');
  await expect(own).toContainText('13.5 to 18.0 %');
}

/** Moves two settings with the step buttons and watches the forecast follow. Answers what is set then. */
async function adjust(page: Page, chief: Person): Promise<Record<string, number>> {
  await page.getByRole('radio', { name: /^Adjust/ }).check();
  const live = page.getByRole('region', { name: 'Forecast for your settings' });
  await expect(live).toHaveAttribute('data-busy', 'false');
  const before = await readForecast(live);
  for (let i = 0; i < 3; i++) await page.getByRole('button', { name: 'Release delay one step down' }).click();
  await page.getByRole('button', { name: 'Launch rpm one step up' }).click();
  await expect.poll(async () => (await readForecast(live)).middlePct).toBeGreaterThan(before.middlePct);
  await expect(live).toHaveAttribute('data-busy', 'false');
  await expectWholeForecast(live);
  await expectNoSidewaysScroll(page);
  return typedSettings(page, chief);
}

async function adjustables({ api }: Person): Promise<Car['adjustables']> {
  const [car] = await api.get<Car[]>('/api/cars');
  return car?.adjustables ?? [];
}

async function typedSettings(page: Page, chief: Person): Promise<Record<string, number>> {
  const typed: Record<string, number> = {};
  for (const { label, unit } of await adjustables(chief))
    typed[label] = Number(await page.getByLabel(`${label} (${unit})`).inputValue());
  return typed;
}

/** The settings as they stand, by label, from the suggestion that is open. */
async function currentSettings(page: Page, chief: Person): Promise<Record<string, number>> {
  const id = new URL(page.url()).pathname.split('/').at(-1);
  const { inputs } = await chief.api.get<{ inputs: { current: Record<string, number> } }>(`/api/suggestions/${id}`);
  const labels = await adjustables(chief);
  return Object.fromEntries(labels.map(({ key, label }) => [label, inputs.current[key] ?? Number.NaN]));
}

/** Label and value of every setting on the sheet. */
async function sheetSettings(sheet: Locator): Promise<Record<string, number>> {
  const labels = await sheet.getByRole('term').allTextContents();
  const values = await sheet.getByRole('definition').allTextContents();
  return Object.fromEntries(
    labels.map((label, i) => [label.trim(), Number.parseFloat((values[i] ?? '').replaceAll(',', ''))]),
  );
}
