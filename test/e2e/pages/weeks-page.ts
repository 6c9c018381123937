import { expect, type Locator, type Page } from '@playwright/test';

const WEEKS_SHOWN = 8;

/** Looms or rows, week over week. */
export class WeeksPage {
  constructor(readonly page: Page) {}

  async open(by: 'loom' | 'row'): Promise<void> {
    await this.page.goto(`/weeks?by=${by}&weeks=${WEEKS_SHOWN}`);
    await expect(this.page.locator('app-weeks-table-view')).toBeVisible();
  }

  /** The last column of weeks. */
  thisWeek(label: string): Locator {
    return this.page
      .locator('app-weeks-table-view tbody tr')
      .filter({ has: this.page.locator('th .label', { hasText: new RegExp(`^(Loom |Row )?${label}$`) }) })
      .locator('td.num')
      .nth(WEEKS_SHOWN - 1);
  }
}
