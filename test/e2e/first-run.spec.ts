import { expectAccessible } from './fixtures/axe.js';
import { expect, test } from './fixtures/fixtures.js';

test.use({ emptyBook: true });

test('the first manager sets the mill up by the one-time code that the server printed', async ({
  mill,
  desk: { page },
}) => {
  expect(mill.firstRunCode).toMatch(/^[A-Z0-9]{4}-[A-Z0-9]{4}-[A-Z0-9]{4}$/);
  await page.goto('/');
  await expect(page.getByRole('heading', { name: 'Set up your mill' })).toBeVisible();
  await expectAccessible(page, 'first run');

  await page.getByRole('textbox', { name: 'One-time code' }).fill('AAAA-BBBB-CCCC');
  await page.getByRole('textbox', { name: 'Name of the mill' }).fill('Low Beck Mill');
  await page.getByRole('textbox', { name: 'Your name' }).fill('Ida Marsh');
  await page.getByRole('textbox', { name: 'E-mail' }).fill('ida@mill.example');
  await page.getByLabel('Password').fill('a long enough one');
  await page.getByRole('button', { name: 'Start the book' }).click();
  await expect(page.getByText('This code is not right or was used already.')).toBeVisible();

  await page.getByRole('textbox', { name: 'One-time code' }).fill(mill.firstRunCode ?? '');
  await page.getByRole('button', { name: 'Start the book' }).click();
  await expect(page.getByRole('button', { name: 'Signed in: Ida Marsh' })).toBeVisible();

  // The code is used up: nobody becomes a second first manager.
  await mill.stop();
  await mill.boot();
  expect(mill.firstRunCode).toBeNull();
});
