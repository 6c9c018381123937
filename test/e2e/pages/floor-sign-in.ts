import { expect, type Page } from '@playwright/test';

/** The door of a registered tablet: works number, then PIN. */
export class FloorSignIn {
  constructor(readonly page: Page) {}

  async signIn(worksNumber: string, pin: string): Promise<void> {
    await this.number(worksNumber);
    await this.pin(pin);
    await expect(this.page.locator('app-floor-sign-in-panel')).toBeHidden({ timeout: 15_000 });
  }

  /** Somebody who has signed in here before is offered by name; without network the PIN opens the screen. */
  async unlock(worksNumber: string, pin: string): Promise<void> {
    await this.page
      .getByRole('group', { name: 'Who has signed in here before' })
      .getByRole('button', { name: new RegExp(`${worksNumber}$`) })
      .click();
    await this.pin(pin);
    await expect(this.page.locator('app-floor-sign-in-panel')).toBeHidden({ timeout: 15_000 });
  }

  /** After a reload with a network the tablet may still know who is signed in. */
  async unlockIfAsked(worksNumber: string, pin: string): Promise<void> {
    const door = this.page.locator('app-floor-sign-in-panel');
    const inside = this.page.locator('app-loomside-page, app-hand-over-page');
    await expect(door.or(inside).first()).toBeVisible();
    if (await door.isVisible()) await this.unlock(worksNumber, pin);
  }

  async number(worksNumber: string): Promise<void> {
    await expect(this.page.getByRole('status', { name: 'Works number' })).toBeVisible();
    await this.press(worksNumber);
    await this.page.getByRole('button', { name: 'On to the PIN' }).click();
  }

  async pin(pin: string): Promise<void> {
    await expect(this.page.getByRole('group', { name: 'PIN', exact: true })).toBeVisible();
    await this.press(pin);
  }

  private async press(digits: string): Promise<void> {
    // A locked page may have keys of its own beneath.
    const door = this.page.locator('app-floor-sign-in-panel');
    for (const digit of digits) await door.getByRole('button', { name: digit, exact: true }).click();
  }
}
