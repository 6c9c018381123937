import { expect, goOffline, test } from './fixtures/fixtures.js';
import { emailOf, PEOPLE } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';

test('a wrong PIN is one sentence, and the pad is empty for the next try', async ({ tablet: { page } }) => {
  await page.goto('/');
  const door = new FloorSignIn(page);
  await door.number(PEOPLE.weaver.worksNumber);
  await door.pin('000000');
  await expect(page.getByText('Number and PIN do not go together.')).toBeVisible();
  await expect(page.getByRole('status', { name: '0 of 6 digits' })).toBeVisible();
});

test('a wrong password is one sentence and says nothing of who exists', async ({ desk: { page } }) => {
  const door = new DeskSignIn(page);
  const sentence = page.getByText('Number and PIN, or e-mail and password, do not go together.');
  await page.goto('/sign-in');
  await door.fill(emailOf('manager'), 'not the password');
  await expect(sentence).toBeVisible();
  await door.fill('nobody@mill.example', 'not the password');
  await expect(sentence).toBeVisible();
});

test('works number and PIN open registered tablets alone, and the screen says who can register one', async ({
  desk: { page },
}) => {
  await page.goto('/sign-in');
  await page.getByRole('button', { name: 'Sign in with works number and PIN' }).click();
  await expect(page.getByText('This browser is not a registered tablet')).toBeVisible();
});

test('a desk without network says so, and what is safe', async ({ mill, desk }) => {
  await desk.page.goto('/sign-in');
  await expect(desk.page.getByRole('textbox', { name: 'E-mail' })).toBeVisible();
  await goOffline(mill, desk);
  await new DeskSignIn(desk.page).fill(emailOf('manager'), 'whatever it is');
  await expect(desk.page.locator('app-error-state')).toContainText(/network|reach/i);
});

test('a weaver’s role opens no office screens', async ({ tablet: { page } }) => {
  await page.goto('/');
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, '135790');
  await page.goto('/weeks');
  await expect(page).not.toHaveURL(/\/weeks/);
});
