import { expect, type Locator, type Page } from '@playwright/test';
import { FloorSignIn } from './floor-sign-in.js';

/** The tackler's calls. */
export class CallsPage {
  constructor(readonly page: Page) {}

  /** A call, in whichever part of the list it stands. */
  card(loom: number): Locator {
    return this.page.getByRole('article', { name: `Loom ${loom}`, exact: true });
  }

  part(name: 'Yours' | 'Waiting' | 'Taken by others' | 'Not written down yet'): Locator {
    return this.page.getByRole('region', { name: new RegExp(`^${name}`) });
  }

  get flash(): Locator {
    return this.page.getByRole('dialog', { name: /^Loom/ });
  }

  async nobodyWaits(): Promise<void> {
    await expect(this.page.getByRole('heading', { name: 'Nobody waits' })).toBeVisible({ timeout: 20_000 });
  }

  /** After a reload with a network the tablet may still know who is signed in. */
  async backIn(worksNumber: string, pin: string): Promise<void> {
    const door = this.page.locator('app-floor-sign-in-panel');
    await expect(door.or(this.page.locator('app-calls-frame')).first()).toBeVisible({ timeout: 20_000 });
    if (await door.isVisible()) await new FloorSignIn(this.page).unlock(worksNumber, pin);
  }

  async say(loom: number, step: 'Take it' | 'I am there' | 'Done' | 'Leave it undone'): Promise<void> {
    await this.card(loom).getByRole('button', { name: step, exact: true }).click();
  }

  /** The repair's form. */
  async write(said: {
    fault: string;
    found: string;
    done: string;
    part?: string;
    ran: string;
  }): Promise<void> {
    await this.page.getByLabel('Kind of fault').selectOption({ label: said.fault });
    await this.page.getByLabel('What was wrong').fill(said.found);
    await this.page.getByLabel('What was done').fill(said.done);
    if (said.part !== undefined) await this.page.getByLabel('Part put in').selectOption({ label: said.part });
    await this.page.getByRole('radio', { name: said.ran }).check();
  }

  async photograph(picture: Buffer): Promise<void> {
    await this.page
      .locator('app-photo-taker input[type=file]')
      .setInputFiles({ name: 'loom.jpg', mimeType: 'image/jpeg', buffer: picture });
    await expect(this.page.locator('app-photo-taker img')).toHaveCount(1);
  }

  async save(): Promise<void> {
    await this.page.getByRole('button', { name: 'Save the repair' }).click();
    await expect(this.page).toHaveURL(/\/calls$/);
  }
}
