import { expect, type Locator, type Page } from '@playwright/test';

/** A loom line opened from the sheet: its record, flags with remedies, corrections. */
export class LoomLinePage {
  constructor(readonly page: Page) {}

  async open(shiftKey: string, loomId: string): Promise<void> {
    await this.page.goto(`/shift-book/${encodeURIComponent(shiftKey)}/loom/${loomId}`);
    await expect(this.page.getByRole('heading', { name: 'The record' })).toBeVisible();
  }

  /** Entries of the record that say this. */
  entries(words: string | RegExp): Locator {
    return this.page.locator('app-loom-story li').filter({ hasText: words });
  }

  figure(label: string): Locator {
    return this.page
      .locator('dl > div')
      .filter({ has: this.page.getByText(label, { exact: true }) })
      .locator('dd');
  }

  remedy(flag: string): Locator {
    return this.page.locator('.remedies li').filter({ hasText: flag });
  }

  /** A row of a before-and-after table. */
  change(label: string): Locator {
    return this.page
      .locator('form app-before-after tr')
      .filter({ has: this.page.getByRole('rowheader', { name: label, exact: true }) });
  }
}
