import { expect, type Locator, type Page } from '@playwright/test';

export type Tap = 'Warp break' | 'Weft break' | 'Pern change';

/** A weaver's looms. */
export class LoomsidePage {
  constructor(readonly page: Page) {}

  async open(): Promise<void> {
    await this.page.goto('/loomside');
  }

  card(loom: number): Locator {
    return this.page
      .locator('app-loom-card')
      .filter({ has: this.page.getByRole('link', { name: `Loom ${loom}, its list`, exact: true }) });
  }

  /** The usual set, then each loom's start reading. `startReadings` by loom number, in walking order. */
  async takeOver(startReadings: readonly (readonly [loom: number, value: number])[]): Promise<void> {
    await this.page.getByRole('link', { name: 'Take over the set' }).click();
    await this.page.getByRole('button', { name: `Take over ${startReadings.length} looms` }).click();
    for (const [loom, value] of startReadings) {
      await expect(this.page.getByRole('heading', { name: `Loom ${loom}`, exact: true })).toBeVisible();
      await this.read('Start reading', value);
    }
    await expect(this.card(startReadings[0]?.[0] ?? 0)).toBeVisible();
  }

  /** After the hand-over: what the shift came to, as this device knows it. */
  figuresRow(loom: number): Locator {
    return this.page
      .locator('app-shift-figures tbody tr')
      .filter({ has: this.page.getByRole('rowheader', { name: String(loom), exact: true }) });
  }

  async read(label: 'Start reading' | 'End reading' | 'Reading now', value: number | string): Promise<void> {
    const field = this.page.getByRole('textbox', { name: new RegExp(`^${label}`) });
    await field.fill(String(value));
    await field.press('Enter');
  }

  /** It stood and runs again. The same tap at once is a finger that bounces: the last one's mark has gone first. */
  async tap(loom: number, cause: Tap): Promise<void> {
    const button = this.card(loom).getByRole('button', { name: new RegExp(`^${cause}, `) });
    await expect(button).not.toHaveClass(/\bjust\b/);
    const label = (await button.getAttribute('aria-label')) ?? '';
    const before = Number(/, (\d+) this shift/.exec(label)?.[1]);
    await button.click();
    await expect(button).toHaveAttribute('aria-label', `${cause}, ${before + 1} this shift`);
  }

  /** Another cause, standing since now. */
  async stands(loom: number, cause: string): Promise<void> {
    await this.card(loom).getByRole('button', { name: 'Other stop' }).click();
    const sheet = this.page.getByRole('dialog');
    await sheet.getByText('Stands since now').click();
    await sheet.getByRole('button', { name: cause }).click();
    await expect(this.card(loom).getByRole('button', { name: 'Running' })).toBeVisible();
  }

  async running(loom: number): Promise<void> {
    await this.card(loom).getByRole('button', { name: 'Running' }).click();
    await expect(this.card(loom).getByRole('button', { name: /^Warp break/ })).toBeVisible();
  }

  /** Each loom's end reading and perns, in walking order. */
  async handOver(ends: readonly (readonly [loom: number, value: number, perns: number])[]): Promise<void> {
    await this.page.getByRole('link', { name: 'Hand over' }).first().click();
    for (const [loom, value, perns] of ends) {
      await expect(this.page.getByRole('heading', { name: `Loom ${loom}`, exact: true })).toBeVisible();
      await this.read('End reading', value);
      await expect(this.page.getByRole('heading', { name: 'Perns used' })).toBeVisible();
      const odd = this.page.getByRole('textbox', { name: 'Odd ones' });
      await odd.fill(String(perns));
      await odd.press('Tab');
      await this.page.getByRole('button', { name: `Save: ${perns} perns` }).click();
    }
    await expect(this.page.getByRole('heading', { name: 'Handed over' })).toBeVisible();
  }
}
