import { expect, type Page } from '@playwright/test';

export interface NewPerson {
  readonly name: string;
  readonly worksNumber: string;
  readonly pin: string;
  readonly role: 'Weaver' | 'Tackler' | 'Foreman';
  /** Numbers of the usual looms, in walking order. */
  readonly set?: readonly number[];
}

/** The rooms of set-up, as a manager works in them. */
export class SetUpPages {
  constructor(readonly page: Page) {}

  async open(room = ''): Promise<void> {
    await this.page.goto(`/set-up/${room}`);
    await expect(this.page.locator('main h1').first()).toBeVisible({ timeout: 20_000 });
  }

  /** By set-up's own step, from its first page. */
  async goOn(step: string): Promise<void> {
    await this.page.goto('/set-up');
    await this.page.getByRole('region', { name: 'The next step' }).getByRole('link', { name: step }).click();
  }

  async firstRun(
    code: string,
    said: { mill: string; name: string; email: string; password: string },
  ): Promise<void> {
    await this.page.goto('/');
    await this.fill({
      'One-time code': code,
      'Name of the mill': said.mill,
      'Your name': said.name,
      'E-mail': said.email,
    });
    await this.page.getByLabel('Password').fill(said.password);
    await this.press('Start the book');
    await expect(this.page.getByRole('heading', { name: `Set up ${said.mill}` })).toBeVisible();
  }

  async addShed(name: string): Promise<void> {
    await this.fill({ 'Name of the shed': name });
    await this.press('Add the shed');
    await expect(this.page.getByRole('heading', { name: `No loom stands in ${name} yet` })).toBeVisible();
  }

  /** Rows of looms that face an alley two by two. */
  async addLooms(said: {
    rows: number;
    perRow: number;
    ppm: number;
    reedSpaceCm: string;
    digits: number;
  }): Promise<void> {
    await this.page.getByRole('button', { name: 'Add looms' }).first().click();
    await this.fill({
      Rows: String(said.rows),
      'Looms in a row': String(said.perRow),
      Speed: String(said.ppm),
      'Reed space': said.reedSpaceCm,
      'Digits of the clock': String(said.digits),
    });
    const count = said.rows * said.perRow;
    await expect(
      this.page.getByRole('heading', { name: `${count} looms, as they will stand` }),
    ).toBeVisible();
    await this.press(`Add ${count} looms`);
    await expect(this.loom(count)).toBeVisible();
  }

  /** A loom on the plan. */
  loom(number: number) {
    return this.page.getByRole('button', { name: `Loom ${number}`, exact: true });
  }

  async addPattern(name: string, starts: string, ends: string): Promise<void> {
    await this.page.getByRole('link', { name: 'Add a pattern' }).click();
    await this.fill({ Name: name, Starts: starts, Ends: ends });
    await this.press('Add the pattern');
    await expect(this.page.getByText(`${name} is saved.`)).toBeVisible();
  }

  async addCloth(name: string): Promise<void> {
    await this.page.getByRole('link', { name: 'Add a cloth' }).click();
    await this.fill({
      Name: name,
      Ends: '2500',
      'Reed width': '160,5',
      'Picks on the loom': '18',
      'Picks in loom state': '19',
      Crimp: '8',
      'Cloths abreast': '1',
      Yarn: 'Ecru 25',
      Count: '25',
      'Share of the picks': '100',
      Waste: '2',
      'Weft on a full pern': '30',
    });
    await this.press('Add the cloth');
    await expect(this.page.getByText(`${name} is saved.`)).toBeVisible();
  }

  /** Says what is on all looms of a row, as it was found. */
  async putOnRow(row: number, cloth: string): Promise<void> {
    await this.page.getByRole('button', { name: `Row ${row}`, exact: true }).click();
    await this.press('On the loom now');
    await this.page.getByRole('combobox', { name: 'Cloth' }).selectOption({ label: cloth });
    await this.press('Put it in the book');
    await expect(this.page.getByText('Saved on this device')).toBeVisible();
  }

  async addPerson({ name, worksNumber, pin, role, set = [] }: NewPerson): Promise<void> {
    await this.open('people/new');
    await this.fill({ Name: name, 'Short name': name, 'Works number': worksNumber, PIN: pin });
    // A new person is a weaver unless somebody says otherwise.
    await this.page.getByRole('checkbox', { name: /^Weaver/ }).setChecked(role === 'Weaver');
    await this.page.getByRole('checkbox', { name: new RegExp(`^${role}`) }).check();
    for (const number of set)
      await this.page
        .getByRole('combobox', { name: 'Add a loom at the end' })
        .selectOption({ label: `Loom ${number}` });
    await this.press('Add the person');
    await expect(this.page.getByText(`${name} is saved.`)).toBeVisible();
  }

  /** The code that makes another browser a tablet of the mill's only shed. */
  async makeTabletCode(name: string): Promise<string> {
    await this.fill({ 'Name of the tablet': name });
    await this.press('Make a code for it');
    const code = this.page.locator('app-tablet-code-card .code');
    await expect(code).toBeVisible();
    return (await code.innerText()).trim();
  }

  /** Changes a loom's speed from now, or from a date and time of the mill's clock. */
  async changeSpeed(loom: number, ppm: number, from?: { date: string; time: string }): Promise<void> {
    await this.open('looms');
    await this.loom(loom).click();
    await this.press('Speed, clock and the rest');
    await this.fill({ Speed: String(ppm) });
    if (from) {
      await this.page.getByRole('radio', { name: 'A date and time' }).check();
      await this.page.getByLabel('Date', { exact: true }).fill(from.date);
      await this.fill({ Time: from.time });
    }
    await this.press('Save');
    await expect(this.page.getByText('Saved.')).toBeVisible();
  }

  private async fill(fields: Readonly<Record<string, string>>): Promise<void> {
    for (const [name, value] of Object.entries(fields))
      await this.page.getByRole('textbox', { name, exact: true }).fill(value);
  }

  private press(name: string): Promise<void> {
    return this.page.getByRole('button', { name, exact: true }).click();
  }
}
