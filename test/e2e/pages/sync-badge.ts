import { expect, type Page } from '@playwright/test';

/** How sync stands, in the header; a tap lists what waits. */
export class SyncBadge {
  constructor(private readonly page: Page) {}

  async says(words: string | RegExp): Promise<void> {
    await expect(this.page.locator('app-sync-badge')).toContainText(words, { timeout: 30_000 });
  }

  async open(): Promise<void> {
    await this.page.locator('app-sync-badge').getByRole('button').click();
    await expect(this.page.locator('app-sync-panel')).toBeVisible();
  }

  get panel() {
    return this.page.locator('app-sync-panel');
  }
}
