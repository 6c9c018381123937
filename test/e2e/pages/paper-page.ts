import { expect, type Locator, type Page } from '@playwright/test';

/** The grid in which a shift's cards are typed. Counts the keys that were pressed. */
export class PaperPage {
  keys = 0;

  constructor(readonly page: Page) {}

  async open(shiftKey: string): Promise<void> {
    await this.page.goto(`/shift-book/${encodeURIComponent(shiftKey)}/paper`);
    await expect(this.page.getByRole('heading', { name: 'From paper' })).toBeVisible();
  }

  cell(loom: number, what: string): Locator {
    return this.page.getByRole('textbox', { name: `Loom ${loom}, ${what}` });
  }

  /** Types into whatever has the focus, key by key. */
  async type(text: string): Promise<void> {
    for (const key of text) await this.press(key);
  }

  async press(key: string): Promise<void> {
    this.keys += 1;
    await this.page.keyboard.press(key);
  }
}
