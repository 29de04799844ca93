import type { Page } from '@playwright/test';
import { ROLE_LABEL, ROLES, type Role } from '@/lib/domain/permissions';
import type { Car, Person } from '../helpers/people';
import { expect, test } from '../helpers/test';

// Written out and not asked of the table of rights: what a role gets is the product's promise.
const EVERYTHING = [
  'Today',
  'Conditions',
  'Passes',
  'Suggestion',
  'Launch sheet',
  'Events',
  'Cars',
  'Tracks',
  'Team',
] as const;

const ENTRIES: Record<Role, readonly string[]> = {
  owner: EVERYTHING,
  crew_chief: EVERYTHING,
  tuner: EVERYTHING,
  crew: EVERYTHING,
  driver: EVERYTHING.filter((entry) => entry !== 'Conditions' && entry !== 'Suggestion'),
};

/** Pages that not everybody opens, and for whom they open. */
const PAGES: Record<string, readonly Role[]> = {
  '/suggestions': ['owner', 'crew_chief', 'tuner', 'crew'],
  '/suggestions/new': ['owner', 'crew_chief', 'tuner'],
  '/test-session': ['owner', 'crew_chief', 'tuner', 'crew'],
  '/passes/new': ['owner', 'crew_chief', 'tuner'],
  '/passes/import': ['owner', 'crew_chief', 'tuner'],
  '/events/new': ['owner', 'crew_chief', 'tuner'],
  '/tracks/new': ['owner', 'crew_chief', 'tuner'],
  '/cars/new': ['owner', 'crew_chief'],
};

for (const role of ROLES) {
  test(`the ${ROLE_LABEL[role].toLowerCase()} finds what the role may do, and nothing else`, async ({
    demo,
    open,
    complaints,
  }) => {
    complaints.allow(/status of 403/);
    const page = await open(await demo(role));
    await page.goto('/');
    await expect(page.getByText(`, ${ROLE_LABEL[role]}`)).toBeVisible();
    const links = page.getByRole('navigation', { name: 'Main' }).getByRole('link');
    expect(await links.allInnerTexts()).toEqual(ENTRIES[role]);
    for (const [path, roles] of Object.entries(PAGES)) await expectOpens(page, path, roles.includes(role));
    await expectButtons(page, role);
  });
}

async function expectOpens(page: Page, path: string, opens: boolean): Promise<void> {
  const answer = await page.goto(path);
  expect(answer?.status(), path).toBe(opens ? 200 : 403);
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
}

/** Inside the pages that everybody opens. */
async function expectButtons(page: Page, role: Role): Promise<void> {
  const count = (shown: boolean) => (shown ? 1 : 0);
  const logs = role !== 'crew' && role !== 'driver';
  await page.goto('/conditions');
  await expect(page.getByRole('heading', { name: 'Latest readings' })).toBeVisible();
  await expect(page.getByRole('button', { name: 'Save', exact: true })).toHaveCount(count(role !== 'driver'));
  await page.goto('/passes');
  await expect(page.getByRole('link', { name: 'Log a pass' })).toHaveCount(count(logs));
  await expect(page.getByRole('link', { name: 'Export' })).toHaveCount(count(logs));
  await page.goto('/team');
  await expect(page.getByRole('radio', { name: /^Metric/ })).toHaveCount(count(role === 'owner'));
}

test('who may read a suggestion and who may decide on it', async ({ demo, open, complaints }) => {
  complaints.allow(/status of 403/);
  const path = `/suggestions/${await askedByTuner(await demo('tuner'))}`;
  for (const role of ROLES) {
    const person = await demo(role);
    const page = await open(person);
    await page.goto(path);
    const decides = role === 'owner' || role === 'crew_chief';
    await expect(page.getByRole('button', { name: 'Record the decision' })).toHaveCount(decides ? 1 : 0);
    await expect(page.getByRole('figure').first()).toBeVisible({ visible: role !== 'driver' });
    if (!decides) await expectNoDecision(person, path);
  }
});

test('the driver is sent from a suggestion to the launch sheet, without odds', async ({ demo, open, complaints }) => {
  complaints.allow(/status of 403/);
  const driver = await open(await demo('driver'));
  const answer = await driver.goto(`/suggestions/${await askedByTuner(await demo('tuner'))}`);
  expect(answer?.status()).toBe(403);
  await expect(driver.getByRole('main')).not.toContainText(/\d %|passes of your own/);
  await driver.getByRole('link', { name: 'Open the launch sheet' }).click();
  await expect(driver).toHaveURL('/sheet');
});

test('only chief and owner are asked for their own estimate', async ({ demo, open }) => {
  for (const role of ['owner', 'crew_chief', 'tuner'] as const) {
    const page = await open(await demo(role));
    await page.goto('/suggestions/new');
    await expect(page.getByLabel('Slip I expect')).toHaveCount(role === 'tuner' ? 0 : 1);
    await expect(page.getByRole('button', { name: 'Ask the model' })).toHaveCount(role === 'tuner' ? 1 : 0);
  }
});

async function askedByTuner({ api }: Person): Promise<string> {
  const [car] = await api.get<Car[]>('/api/cars');
  const [reading] = await api.get<{ id: string }[]>('/api/readings?limit=1');
  const rounds = await api.get<{ id: string; name: string; plannedAt: string }[]>('/api/rounds');
  const round = rounds.find(({ plannedAt }) => Date.parse(plannedAt) > Date.now());
  const asked = { carId: car?.id, readingId: reading?.id, roundId: round?.id };
  return (await api.post<{ id: string }>('/api/suggestions', asked)).id;
}

/** Not even by sending the form that is not there. */
async function expectNoDecision({ api }: Person, path: string): Promise<void> {
  const form = { _form: 'decide', pick: 'decline', reason: 'Not my call' };
  expect((await api.request.post(path, { form })).status()).toBe(403);
  const data = { choice: 'decline', reason: 'Not my call' };
  expect((await api.request.post(`/api${path}/decision`, { data })).status()).toBe(403);
}
