import type { Page } from '@playwright/test';
import { expect, expectAccessible, signIn, test } from '../helpers/test';

const PHONE = { width: 390, height: 844 };

// The form starts with the way of the last reading, which another test may have left otherwise.
async function fillUsual(page: Page): Promise<void> {
  await page.getByRole('radio', { name: 'Relative' }).check({ force: true });
  await page.getByRole('radio', { name: 'Station' }).check({ force: true });
  await page.getByLabel('Air temperature (°F)').fill('84,2');
  await page.getByLabel('Relative humidity (%)').fill('31');
  await page.getByLabel('Track temperature (°F)').fill('118');
}

test.describe('at the fence', () => {
  test.use({ viewport: PHONE });

  test('the tuner enters a reading, is asked about a slip, fixes it with one tap, and sees what was stored', async ({
    page,
  }) => {
    await signIn(page, 'tuner');
    await page.goto('/conditions');
    await fillUsual(page);
    // The form starts with the kind of the reading before, which may be another test's.
    await page.getByRole('radio', { name: 'Station' }).check();
    await page.getByLabel('Pressure (inHg)').fill('29.95');
    await page.getByLabel('Where on the track').focus();
    await expect(page.getByText('That looks sea-level corrected')).toBeVisible();
    await expectAccessible(page);
    await page.getByRole('button', { name: 'It is an altimeter setting' }).click();
    await expect(page.getByText('That looks sea-level corrected')).toBeHidden();
    await expect(page.getByText(/^= 2\d\.\d\d inHg at the station, from the track's altitude/)).toBeVisible();
    await expect(page.locator('.thumb-bar')).toContainText(/Density altitude\s*[\d,]+ ft/);
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByRole('heading', { name: 'Stored' })).toBeVisible();
    await expect(page.locator('#saved')).toContainText('Altimeter setting');
    await expect(page.getByRole('link', { name: 'Go to suggestion' })).toBeVisible();
    await expectAccessible(page);
  });

  test('without signal nothing is lost, and trying again stores it once', async ({ page, context, complaints }) => {
    complaints.allow(/ERR_INTERNET_DISCONNECTED/);
    await signIn(page, 'tuner');
    await page.goto('/conditions');
    await fillUsual(page);
    const entry = await page.locator('input[name="clientId"]').inputValue();
    await context.setOffline(true);
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByRole('alert')).toContainText('No connection. Your values are still here.');
    await expect(page.getByLabel('Air temperature (°F)')).toHaveValue('84,2');
    await context.setOffline(false);
    await page.getByRole('button', { name: 'Try again' }).dblclick();
    await expect(page.getByRole('heading', { name: 'Stored' })).toBeVisible();
    const readings: { clientId: string | null; airTempC: number }[] = await (
      await page.request.get('/api/readings')
    ).json();
    const stored = readings.filter(({ clientId }) => clientId === entry);
    expect(stored.map(({ airTempC }) => airTempC.toFixed(2))).toEqual(['29.00']);
  });

  test('an impossible value is stopped before it is sent', async ({ page }) => {
    await signIn(page, 'tuner');
    await page.goto('/conditions');
    await page.getByLabel('Air temperature (°F)').fill('900');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByText(/Air temperature 900.0 °F is not possible/)).toBeVisible();
    await expect(page.getByLabel('Air temperature (°F)')).toBeFocused();
    await expect(page).toHaveURL('/conditions');
  });
});

test.describe('without script', () => {
  test.use({ javaScriptEnabled: false });

  test('a reading is refused with its reason, kept, stored, and corrected by a new one', async ({
    page,
    complaints,
  }) => {
    complaints.allow(/status of 400/);
    await signIn(page, 'tuner');
    await page.goto('/conditions');
    await fillUsual(page);
    await page.getByRole('radio', { name: 'Dew point' }).check({ force: true });
    await page.getByLabel('Dew point (°F)').fill('99');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByRole('alert').first()).toContainText('above the air temperature');
    await expect(page.getByLabel('Air temperature (°F)')).toHaveValue('84,2');
    await page.getByLabel('Dew point (°F)').fill('52');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.locator('#saved')).toContainText('52.0 °F');

    await page.getByRole('link', { name: 'Correct this reading' }).click();
    await page.getByLabel('Dew point (°F)').fill('54');
    await page.getByLabel('Why is it corrected?').fill('Misread the meter');
    await page.getByRole('button', { name: 'Save correction' }).click();
    await expect(page.getByRole('heading', { name: 'Correction stored' })).toBeVisible();
    await expect(page.locator('#saved')).toContainText('54.0 °F');
  });
});

test('the driver sees the readings and no form', async ({ page }) => {
  await signIn(page, 'driver');
  await page.goto('/conditions');
  await expect(page.getByRole('heading', { name: 'Latest readings' })).toBeVisible();
  await expect(page.getByRole('button', { name: 'Save', exact: true })).toHaveCount(0);
});
