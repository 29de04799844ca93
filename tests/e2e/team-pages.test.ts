import { expect, expectAccessible, signIn, test } from '../helpers/test';

test('somebody not signed in learns what this is, in day and night', async ({ page }) => {
  await page.goto('/');
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  await expect(page.getByRole('img', { name: /^Example forecast: of 20/ })).toBeVisible();
  await expectAccessible(page);
  await page.getByRole('button', { name: 'Night' }).click();
  await expect(page.locator('html')).toHaveAttribute('data-theme', 'night');
  await expectAccessible(page);
  await page.reload();
  await expect(page.getByRole('button', { name: 'Night' })).toHaveAttribute('aria-pressed', 'true');
});

test('a signed-out reader of a page comes back to it after signing in, and never to another site', async ({ page }) => {
  await page.goto('/tracks');
  await expect(page).toHaveURL(/next=%2Ftracks/);
  await page.goto('/sign-in?next=//evil.invalid/');
  await signInHere(page);
  await expect(page).toHaveURL('/');
});

test.describe('without script', () => {
  test.use({ javaScriptEnabled: false });

  test('the chief changes a belief, sees it drawn, and a wrong limit keeps what was typed', async ({
    page,
    complaints,
  }) => {
    complaints.allow(/status of 400/);
    await signIn(page, 'crew_chief');
    await page.getByRole('link', { name: 'Cars' }).first().click();
    await page.getByRole('link', { name: /^Open/ }).first().click();
    await page.getByRole('link', { name: 'Release delay' }).click();
    await page.getByLabel('One step up changes slip by').fill('-0,6');
    await page.getByLabel('Give or take').fill('0.5');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByRole('img', { name: /Effect of one step up on slip: −0.6 ± 0.5 points/ })).toBeVisible();

    await page.getByLabel('High limit').fill('-5');
    await page.getByLabel('Name').fill('Release delay, stage one');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByRole('alert')).toContainText('Not saved');
    await expect(page.getByLabel('High limit')).toHaveAttribute('aria-invalid', 'true');
    await expect(page.getByLabel('Name')).toHaveValue('Release delay, stage one');
  });

  test('the tuner adds a track and an event, then rounds on the clock of the track', async ({ page }) => {
    await signIn(page, 'tuner');
    await page.goto('/tracks/new');
    await page.getByLabel('Track name').fill('Quiet Harbor Strip');
    await page.getByLabel('Altitude').fill('210');
    await page.getByLabel('Time zone').selectOption('America/New_York');
    await page.getByRole('button', { name: 'Add the track' }).click();
    await expect(page.getByRole('row', { name: /Quiet Harbor Strip/ })).toContainText('210 ft');

    await page.goto('/events/new');
    await page.getByLabel('Event name').fill('Harbor Test');
    await page.getByLabel('Track').selectOption('Quiet Harbor Strip');
    await page.getByLabel('First day').fill('2031-07-04');
    await page.getByRole('button', { name: 'Add the event' }).click();
    await page.getByLabel('Round').fill('T1');
    await page.getByLabel('Planned time').fill('2031-07-04T14:05');
    await page.getByRole('button', { name: 'Add the round' }).click();
    await expect(page.getByRole('listitem').filter({ hasText: 'T1' })).toContainText('2:05 PM');
  });

  test('a driver is not offered what they may not do, and is refused kindly when they go there', async ({
    page,
    complaints,
  }) => {
    complaints.allow(/status of 403/);
    await signIn(page, 'driver');
    await expect(page.getByRole('link', { name: 'Suggestion' })).toHaveCount(0);
    const answer = await page.goto('/cars/new');
    expect(answer?.status()).toBe(403);
    await expect(page.getByRole('heading', { name: 'Your role does not open this page' })).toBeVisible();
  });
});

test('every page of the team is accessible to what a program can see', async ({ page }) => {
  await signIn(page, 'crew_chief');
  for (const path of ['/cars', '/cars/new', '/tracks', '/tracks/new', '/events', '/events/new', '/team']) {
    await page.goto(path);
    await expectAccessible(page);
  }
  await page.goto('/cars');
  await page.getByRole('link', { name: /^Open/ }).first().click();
  await expectAccessible(page);
  await page.goto('/events');
  await page.getByRole('main').getByRole('listitem').first().getByRole('link').click();
  await expectAccessible(page);
});

test.describe('on a phone', () => {
  test.use({ viewport: { width: 390, height: 844 } });

  test('no page of the team scrolls sideways, and More holds the rest', async ({ page }) => {
    await signIn(page, 'owner');
    for (const path of ['/', '/cars', '/cars/new', '/tracks', '/tracks/new', '/events', '/events/new', '/team']) {
      await page.goto(path);
      const beyond = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect(beyond, path).toBeLessThanOrEqual(0);
    }
    await page.locator('summary', { hasText: 'More' }).click();
    await page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: 'Tracks' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Tracks' })).toBeVisible();
  });

  // In a team of its own: the units of the demo team are everybody's.
  test('the owner switches the units and the altitudes follow', async ({ owner, open }) => {
    const person = await owner();
    await person.api.post('/api/tracks', { name: 'Quiet Harbor Strip', altitudeM: 640, timeZone: 'America/Denver' });
    const page = await open(person, { viewport: { width: 390, height: 844 } });
    await setUnits(page, 'Metric');
    await page.goto('/tracks');
    await expect(page.getByText('640 m', { exact: true })).toBeVisible();
    await setUnits(page, 'US');
    await page.goto('/tracks');
    await expect(page.getByText('2,100 ft', { exact: true })).toBeVisible();
  });
});

async function setUnits(page: import('@playwright/test').Page, name: string): Promise<void> {
  await page.goto('/team');
  await page.getByRole('radio', { name: new RegExp(`^${name}`) }).check();
  await page.getByRole('button', { name: 'Save' }).click();
  await expect(page.getByRole('status')).toContainText('Saved');
}

async function signInHere(page: import('@playwright/test').Page): Promise<void> {
  await page.getByLabel('Email').fill('chief@slipband.example');
  await page.getByLabel('Password').fill('demo-pass-slipband');
  await page.getByRole('button', { name: 'Sign in' }).click();
}
