import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { SheetCards } from './sheet-cards';
import { SheetTable } from './sheet-table';
import { leftOutWords, sheetRows, totalFigures } from '@shared/sheet/sheet-rows';
import { aSheet } from './testing/a-sheet';

function tableOf(sheet = aSheet()) {
  const fixture = TestBed.createComponent(SheetTable);
  fixture.componentRef.setInput('rows', sheetRows(sheet));
  fixture.componentRef.setInput('total', totalFigures(sheet));
  fixture.componentRef.setInput('caption', 'Loom lines');
  fixture.componentRef.setInput('hours', '06:00 to 14:00');
  fixture.detectChanges();
  const root: HTMLElement = fixture.nativeElement;
  const row = (loom: number) => {
    const found = [...root.querySelectorAll('tbody tr')].find(
      (one) => one.querySelector('th')?.textContent?.trim() === String(loom),
    );
    if (!found) throw new Error(`no row for loom ${loom}`);
    return [...found.children].map((cell) => (cell.textContent ?? '').replace(/\s+/g, ' ').trim());
  };
  return { root, row };
}

beforeEach(() => TestBed.configureTestingModule({ providers: [provideRouter([])] }));

describe('SheetTable', () => {
  it('shows a whole line: 74,250 picks of 86,400, 3 warp breaks, 50 min timed, 180 s estimated', () => {
    const cells = tableOf().row(1);
    expect(cells.slice(2, 5)).toEqual(['74,250', '85.9%', '9,281']);
    expect(cells[5]).toBe('4.0 , 95% interval 0.8–11.8');
    expect(cells[6]).toBe('2.7 , 95% interval 0.3–9.7');
    // 12,150 picks lost are 67.5 min at 180 ppm: 50 timed, 3 estimated, 14.5 nobody logged.
    expect(cells.slice(7, 10)).toEqual(['50', '3', '15']);
  });

  it('says in words why a line has no figure, and still shows what was counted', () => {
    const cells = tableOf().row(2);
    expect(cells[2]).toBe('–no figure: the reading at the end is missing');
    expect(cells[3]).toBe('–no figure: the reading at the end is missing');
    expect(cells[5]).toBe('–no figure: the reading at the end is missing; 1 break');
    expect(cells.at(-1)).toContain('no end reading');
    for (const cell of cells) expect(cell).not.toMatch(/NaN|Infinity|null|undefined/);
  });

  it('puts lines that need a look first and names what is missing', () => {
    const { root, row } = tableOf();
    const looms = [...root.querySelectorAll('tbody th')].map((cell) => cell.textContent?.trim());
    expect(looms).toEqual(['2', '3', '1']);
    expect(row(3)[1]).toContain('no weaver');
  });

  it('shows two flags of a line, how many more its record has, and all of them on paper', () => {
    const sheet = aSheet();
    const flags = sheetRows(sheet)[0]?.flags ?? [];
    const many = ['one', 'two', 'three', 'four'].map((words) => ({ words, look: true }));
    expect(flags.length).toBeLessThanOrEqual(2);
    const fixture = TestBed.createComponent(SheetTable);
    fixture.componentRef.setInput('rows', [
      ...sheetRows(sheet).slice(1),
      { ...sheetRows(sheet)[0], loom: 9, flags: many },
    ]);
    fixture.componentRef.setInput('total', null);
    fixture.componentRef.setInput('caption', 'Loom lines');
    fixture.componentRef.setInput('hours', '06:00 to 14:00');
    fixture.detectChanges();
    const row: HTMLElement = fixture.nativeElement.querySelector('tbody tr:last-child');
    expect([...row.querySelectorAll('span.flag')].map((one) => one.textContent)).toEqual(
      many.map((one) => one.words),
    );
    expect(row.querySelectorAll('.flag.rest')).toHaveLength(2);
    expect(row.querySelector('a.more')?.textContent).toBe('+2');
  });

  it('tints the lines that need a look only where others do not', () => {
    const { root } = tableOf();
    expect(root.querySelectorAll('tbody tr.look')).toHaveLength(2);
    const looks = sheetRows(aSheet()).filter((row) => row.needsLook);
    const fixture = TestBed.createComponent(SheetTable);
    fixture.componentRef.setInput('rows', looks);
    fixture.componentRef.setInput('total', null);
    fixture.componentRef.setInput('caption', 'Loom lines');
    fixture.componentRef.setInput('hours', '06:00 to 14:00');
    fixture.detectChanges();
    expect(fixture.nativeElement.querySelectorAll('tbody tr.look')).toHaveLength(0);
    expect(fixture.nativeElement.querySelectorAll('.flag.look').length).toBeGreaterThan(0);
  });

  it('sums the lines that have figures alone, and says which are left out', () => {
    const sheet = aSheet();
    const { root } = tableOf(sheet);
    expect(root.querySelector('tfoot')?.textContent).toContain('74,250');
    expect(root.querySelector('tfoot')?.textContent).toContain('85.9%');
    expect(leftOutWords(sheet.total)).toBe(
      '2 loom lines are left out of the totals: a reading is missing or the picks were agreed.',
    );
  });

  it('gives no total of nothing', () => {
    const [, , none] = [...aSheet().lines];
    const sheet = aSheet(600, none ? [[]] : []);
    expect(totalFigures(sheet).measured).toEqual({
      text: '–',
      why: 'no loom line counts yet',
      atMost: false,
    });
  });
});

describe('a shift that runs', () => {
  it('shows the most that can be, marked, and asks nobody for its end', () => {
    const cells = tableOf(aSheet(240)).row(2);
    // 180 ppm × (240 min − 1 min allowance) = 43,020 picks at most.
    expect(cells[2]).toBe('at most 43,020');
    expect(cells[3]).toBe('at most 99.6%');
    expect(cells.at(-1)).not.toContain('no end reading');
  });
});

describe('SheetCards', () => {
  it('says the same on a phone', () => {
    const fixture = TestBed.createComponent(SheetCards);
    fixture.componentRef.setInput('rows', sheetRows(aSheet()));
    fixture.detectChanges();
    const cards = [...fixture.nativeElement.querySelectorAll('li.card')] as HTMLElement[];
    expect(cards.map((card) => card.querySelector('h3')?.textContent)).toEqual([
      'Loom 2',
      'Loom 3',
      'Loom 1',
    ]);
    expect(cards[0]?.textContent).toContain('no figure: the reading at the end is missing');
    expect(cards[2]?.textContent).toContain('85.9%');
    expect(cards[2]?.textContent?.replace(/\s+/g, ' ')).toContain('50 timed · 3 estimated');
  });
});
