import { expect, type Locator, type Page } from '@playwright/test';

/** The shed as it stands. */
export class FloorPage {
  constructor(readonly page: Page) {}

  async open(): Promise<void> {
    await this.page.goto('/floor');
  }

  tile(loom: number): Locator {
    return this.page.getByRole('button', { name: new RegExp(`^Loom ${loom} `) });
  }

  /** What the tile says of the loom: "at most 80.3 %" is 80.3. */
  async efficiency(loom: number): Promise<number> {
    const label = (await this.tile(loom).getAttribute('aria-label')) ?? '';
    return Number(/efficiency at most ([\d.]+)%/.exec(label)?.[1]);
  }

  /** "5 of 6 looms running". */
  async running(words: string): Promise<void> {
    await expect(this.page.locator('.total').filter({ hasText: 'looms running' })).toContainText(words);
  }

  get calls(): Locator {
    return this.page.locator('.total').filter({ hasText: /calls? waiting/ });
  }

  /** "Live", or since when not. */
  get news(): Locator {
    return this.page.getByRole('status').filter({ hasText: /^(Live|As of)/ });
  }

  filter(name: string): Locator {
    return this.page.getByRole('group', { name: 'Which looms' }).getByRole('button', { name });
  }

  line(loom: number): Locator {
    return this.page.getByRole('dialog', { name: `Loom ${loom}` });
  }
}
