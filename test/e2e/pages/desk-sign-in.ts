import { expect, type Page } from '@playwright/test';
import { emailOf, PASSWORD, type Who } from '../fixtures/mill-facts.js';

/** The door of a desk browser: e-mail and password. */
export class DeskSignIn {
  constructor(readonly page: Page) {}

  async signIn(who: Who): Promise<void> {
    await this.page.goto('/sign-in');
    await this.fill(emailOf(who), PASSWORD);
    await expect(this.page.getByRole('heading', { name: 'Sign in' })).toBeHidden({ timeout: 15_000 });
  }

  async fill(email: string, password: string): Promise<void> {
    const toOffice = this.page.getByRole('button', { name: 'Sign in with e-mail and password' });
    const emailField = this.page.getByRole('textbox', { name: 'E-mail' });
    await expect(toOffice.or(emailField).first()).toBeVisible();
    if (await toOffice.isVisible()) await toOffice.click();
    await emailField.fill(email);
    await this.page.getByLabel('Password').fill(password);
    await this.page.getByRole('button', { name: 'Sign in', exact: true }).click();
  }
}
