import { DEMO_PEOPLE, expect, expectAccessible, signIn, test } from '../helpers/test';

test('a page of the team asks for a sign-in and the sign-in page is accessible', async ({ page }) => {
  await page.goto('/cars');
  await expect(page).toHaveURL(/\/sign-in/);
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  await expectAccessible(page);
});

test('a wrong password is refused with a reason and keeps the address', async ({ page, complaints }) => {
  complaints.allow(/status of 401/);
  await page.goto('/sign-in');
  await page.getByLabel('Email').fill('nobody@slipband.example');
  await page.getByLabel('Password').fill('not the password');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await expect(page.getByText('Not signed in')).toBeVisible();
  await expect(page.getByLabel('Email')).toHaveValue('nobody@slipband.example');
});

for (const person of DEMO_PEOPLE) {
  test(`${person.role} signs in, sees the start page and signs out`, async ({ page, context }) => {
    await signIn(page, person.role);
    await expect(page.getByRole('main')).toBeVisible();
    await expectAccessible(page);
    const session = async () => (await context.cookies()).find(({ name }) => name === '__Host-session');
    expect(await session()).toMatchObject({ httpOnly: true, secure: true, sameSite: 'Lax', path: '/' });

    await page.getByRole('button', { name: 'Sign out' }).first().click();
    await expect(page.getByRole('button', { name: 'Sign out' })).toHaveCount(0);
    expect(await session()).toBeUndefined();
    await page.goto('/cars');
    await expect(page).toHaveURL(/\/sign-in/);
  });
}

// The fixture itself: without it a page could break its content policy unseen.
test('a breach of the content policy is a complaint that fails a test', async ({ page, complaints }) => {
  await page.goto('/sign-in');
  await page.evaluate(() => document.body.setAttribute('style', 'color: red'));
  await expect.poll(() => complaints.found().join()).toMatch(/console: .*Content Security Policy/);
  complaints.allow(/Content Security Policy/);
});
