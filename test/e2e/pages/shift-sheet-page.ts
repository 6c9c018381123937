import { expect, type Locator, type Page } from '@playwright/test';

/** Columns of the sheet as a person reads them. */
const COLUMNS = [
  'what',
  'picks',
  'efficiency',
  'picksPerHour',
  'warp',
  'weft',
  'timed',
  'estimated',
  'notLogged',
];

/** The sheet of a shift. */
export class ShiftSheetPage {
  constructor(readonly page: Page) {}

  async open(shiftKey: string): Promise<void> {
    await this.page.goto(`/shift-book/${encodeURIComponent(shiftKey)}`);
    await expect(this.page.locator('app-sheet-table')).toBeVisible();
  }

  row(loom: number): Locator {
    return this.page
      .locator('app-sheet-table tbody tr')
      .filter({ has: this.page.getByRole('rowheader', { name: String(loom), exact: true }) });
  }

  cell(loom: number, column: string): Locator {
    return this.row(loom).getByRole('cell').nth(COLUMNS.indexOf(column));
  }
}
