import { randomUUID } from 'node:crypto';
import type { Page } from '@playwright/test';
import { expectWholeForecast } from '../helpers/forecast';
import { addRaceDay, type Owner, SMALL_FILE } from '../helpers/people';
import { expect, expectAlive, test } from '../helpers/test';

const ZONE = 'America/Phoenix';

test('a new team comes from nothing to its first forecast', async ({ page, complaints }) => {
  complaints.allow(/status of 400/);
  await signUp(page);
  await expect(page.getByText('0 of 4 done')).toBeVisible();
  await addCar(page);
  await addTrack(page);
  await addEventWithRound(page);
  await logPass(page);
  await enterReading(page);

  await ask(page);
  await expect(page.getByRole('heading', { level: 1, name: 'No change offered: 7 more passes needed' })).toBeVisible();
  await expect(page.getByText('Log 7 more passes with a measured slip and ask again.')).toBeVisible();
  await expect(page.getByRole('radio', { name: /^Accept/ })).toHaveCount(0);

  await importSample(page);
  await ask(page);
  await expect(page.getByRole('heading', { level: 1 })).not.toContainText('No change offered');
  const offers = page.locator('section').filter({ has: page.getByRole('figure') });
  // One by hand and 24 from the file, one of them without slip.
  const { passesUsed } = await expectWholeForecast(offers.first());
  expect(passesUsed).toBe(24);
  await page.goto('/');
  await expect(page.getByRole('heading', { name: 'Setting up' })).toHaveCount(0);
});

test('what another team has is as if it were not there', async ({ owner, open, complaints }) => {
  complaints.allow(/status of 404/);
  const theirs = await owner();
  const paths = await privatePaths(theirs);
  const ours = await owner();
  const page = await open(ours);
  for (const path of [...paths, '/suggestions/not-an-id', `/passes/${randomUUID()}`]) {
    const answer = await page.goto(path);
    expect(answer?.status(), path).toBe(404);
    await expect(page.getByRole('heading', { name: 'There is nothing here' })).toBeVisible();
    const api = await ours.api.request.get(`/api${path.replace(/\/(edit|correct)$/, '')}`);
    expect(api.status(), `/api${path}`).toBe(404);
    expect(await api.text()).not.toContain('Talbray One');
  }
  const read = await open(theirs);
  for (const path of paths) expect((await read.goto(path))?.status(), `${path} for its own team`).toBe(200);
});

/** Addresses of a team's car, track, event, pass, suggestion and launch sheet. */
async function privatePaths(owner: Owner): Promise<string[]> {
  const { car, roundId, readingId } = await addRaceDay(owner, SMALL_FILE);
  const { api } = owner;
  const asked = await api.post<{ id: string }>('/api/suggestions', { carId: car.id, roundId, readingId });
  const choice = { choice: 'decline', reason: 'Only a test' };
  const decided = await api.post<{ sheet: { id: string } }>(`/api/suggestions/${asked.id}/decision`, choice);
  const { passes } = await api.get<{ passes: { rootId: string }[] }>(`/api/passes?carId=${car.id}`);
  const [track] = await api.get<{ id: string }[]>('/api/tracks');
  const [event] = await api.get<{ id: string }[]>('/api/events');
  return [
    `/cars/${car.id}`,
    `/cars/${car.id}/edit`,
    `/tracks/${track?.id}`,
    `/events/${event?.id}`,
    `/passes/${passes[0]?.rootId}`,
    `/passes/${passes[0]?.rootId}/correct`,
    `/suggestions/${asked.id}`,
  ].concat(`/sheet/${decided.sheet.id}`);
}

async function signUp(page: Page): Promise<void> {
  await page.goto('/');
  await page.getByRole('link', { name: 'Sign up your team' }).click();
  await page.getByLabel('Team name').fill('Kestrel Gulch Racing');
  await page.getByLabel('Your name').fill('Odalys Ferncroft');
  const email = `${randomUUID().slice(0, 8)}@kestrel.example`;
  await page.getByLabel('Email').fill(email);
  await page.getByLabel('Password').fill('short');
  await page.getByRole('button', { name: 'Sign up' }).click();
  await expect(page.getByRole('alert')).toContainText('too short');
  await expect(page.getByLabel('Email')).toHaveValue(email);
  await page.getByLabel('Password').fill('seven slow barrels roll');
  await page.getByRole('button', { name: 'Sign up' }).click();
  await expect(page.getByText('Odalys Ferncroft, Owner')).toBeVisible();
}

async function addCar(page: Page): Promise<void> {
  await page.getByRole('link', { name: 'Add the first car' }).click();
  await page.getByLabel('Car name').fill('Gulch One');
  await page.getByRole('button', { name: 'Add the car' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Gulch One' })).toBeVisible();
  await expect(page.getByRole('table').getByRole('rowheader')).toHaveCount(5);
  await expect(page.getByRole('row', { name: /Launch rpm/ })).toBeVisible();
}

async function addTrack(page: Page): Promise<void> {
  await page.goto('/tracks/new');
  await page.getByLabel('Track name').fill('Kestrel Gulch Strip');
  await page.getByLabel('Altitude').fill('1,150');
  await page.getByLabel('Time zone').selectOption(ZONE);
  await page.getByRole('button', { name: 'Add the track' }).click();
  await expect(page.getByRole('alert')).toContainText('is 1,150 meant as 1150 or as 1.15?');
  await page.getByLabel('Altitude').fill('1150');
  await page.getByLabel('Latitude').fill('33.9');
  await page.getByLabel('Longitude').fill('-112.4');
  await page.getByRole('button', { name: 'Add the track' }).click();
  await expect(page.getByRole('row', { name: /Kestrel Gulch Strip/ })).toContainText('1,150 ft');
}

async function addEventWithRound(page: Page): Promise<void> {
  const planned = trackClock(50);
  await page.goto('/events/new');
  await page.getByLabel('Event name').fill('Gulch Shakedown');
  await page.getByLabel('Track').selectOption('Kestrel Gulch Strip');
  await page.getByLabel('First day').fill(planned.slice(0, 10));
  await page.getByRole('button', { name: 'Add the event' }).click();
  await page.getByLabel('Round', { exact: true }).fill('T1');
  await page.getByLabel('Planned time').fill(planned);
  await page.getByRole('radio', { name: 'Left' }).check();
  await page.getByRole('button', { name: 'Add the round' }).click();
  await expect(page.getByRole('listitem').filter({ hasText: 'T1' })).toContainText('left lane');
}

/** "2026-05-03T14:05" on the clock at the track, so many minutes from now. */
function trackClock(minutes: number): string {
  const at = new Date(Date.now() + minutes * 60_000);
  return at.toLocaleString('sv-SE', { timeZone: ZONE, dateStyle: 'short', timeStyle: 'short' }).replace(' ', 'T');
}

async function logPass(page: Page): Promise<void> {
  await page.goto('/passes/new');
  await page.getByRole('radio', { name: 'Clean' }).check();
  await page.getByLabel('Slip (%)').fill('15.4');
  await page.getByLabel('Time at the track').fill(trackClock(-60));
  const settings = { Counterweight: '11.5', 'Base pressure': '240', 'Release delay': '0.52', 'Launch rpm': '7450' };
  for (const [label, value] of Object.entries(settings)) await page.getByLabel(label).fill(value);
  await page.getByLabel('Tire pressure').fill('6.6');
  await page.getByLabel('Runs on discs').fill('0');
  await page.getByRole('button', { name: 'Save the pass' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Pass 1' })).toBeVisible();
}

async function enterReading(page: Page): Promise<void> {
  await page.goto('/conditions');
  await page.getByLabel('Air temperature (°F)').fill('66');
  await page.getByLabel('Relative humidity (%)').fill('25');
  await page.getByLabel('Pressure (inHg)').fill('28.7');
  await page.getByLabel('Track temperature (°F)').fill('88');
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(page.getByRole('region', { name: 'Stored' })).toContainText('88.0 °F');
}

async function ask(page: Page): Promise<void> {
  await page.goto('/suggestions/new');
  await expect(page.getByLabel('Launch rpm (rpm)')).toHaveValue(/^\d{4}$/);
  await page.getByRole('button', { name: 'Skip my estimate and ask' }).click();
  await expect(page.getByText('skipped the own estimate')).toBeVisible();
}

async function importSample(page: Page): Promise<void> {
  await page.goto('/passes/import');
  await expectAlive(page);
  await page.getByLabel('CSV file').setInputFiles(SMALL_FILE);
  await page.getByRole('button', { name: 'Check the file' }).click();
  await expect(page.getByText('Track Tamsin Flats Strip (1,120 ft, America/Denver)')).toBeVisible();
  await page.getByRole('button', { name: /^Add \d+ passes$/ }).click();
  await expect(page.getByText('24 passes added.')).toBeVisible();
}
