import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ShiftSheet } from '../../../shared/contract/reports.js';
import type { EntryKind } from '../../../shared/entries/entry.js';
import { sheetRows, totalFigures, type Cell, type SheetFigures } from '../../../shared/sheet/sheet-rows.js';
import { sheetTotalWords } from '../../../shared/sheet/sheet-words.js';
import { ingestEntries } from '../book/ingest.js';
import { pdfWords, type PdfWord } from '../../testing/pdf-text.js';
import {
  EARLY,
  entry,
  HOUR,
  insertTestGrants,
  LATE,
  MINUTE,
  MONDAY,
  type Said,
} from '../../testing/test-entries.js';
import { testServer, type SignedInActor, type TestServer } from '../../testing/test-server.js';
import { makePdf } from './pdf.js';
import { sheetDocument } from './sheet-document.js';

const PRINT = { millName: 'Test mill', timeZone: 'Europe/London', note: '' };

describe('the shift sheet as a PDF', () => {
  let server: TestServer;
  let foreman: SignedInActor;

  beforeAll(async () => {
    server = await testServer();
    foreman = await server.signInAs('foreman');
    await server.deps.writer.write(insertTestGrants);
    const read = (loomId: string, boundary: 'start' | 'end', value: number, at: number) =>
      entry('reading', { loomId, shiftKey: EARLY, boundary, value, at } as Said<'reading'>);
    await ingest([
      entry('assign', { shiftKey: EARLY, weaverId: 'wanda', loomIds: ['n1', 'n2'], at: MONDAY }),
      read('n1', 'start', 100, MONDAY),
      read('n1', 'end', 964, MONDAY + 8 * HOUR),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 3, at: MONDAY + 2 * HOUR }),
      entry('stop', {
        loomId: 'n1',
        cause: 'gaiting',
        count: 1,
        at: MONDAY + 3 * HOUR,
        until: MONDAY + 4 * HOUR,
      }),
      read('n2', 'start', 99_900, MONDAY),
      read('n2', 'end', 380, MONDAY + 8 * HOUR),
      read('n3', 'start', 5, MONDAY),
      entry('close', {
        who: 'foreman',
        shiftKey: EARLY,
        at: MONDAY + 8 * HOUR + MINUTE,
        note: 'Watch loom 2: the let-off slips',
      }),
    ]);
  });
  afterAll(() => server.close());

  const ingest = async (entries: { kind: EntryKind }[]) => {
    const { results } = await server.deps.writer.write((tx) =>
      ingestEntries(tx, entries, {
        deviceId: null,
        deviceRevoked: false,
        tabletShedId: null,
        sentAt: server.clock.now,
        serverNow: server.clock.now,
      }),
    );
    expect(results.map(({ result }) => result)).not.toContain('refused');
  };
  const path = (what: string, key = EARLY) => `/reports/shifts/${encodeURIComponent(key)}/${what}`;
  const sheetOf = async (key = EARLY): Promise<ShiftSheet> => {
    const answer = await server.call('get', path('sheet', key), { as: foreman });
    return answer.body as ShiftSheet;
  };
  const pdfOf = async (key = EARLY): Promise<Uint8Array> => {
    const answer = await server.call('get', path('sheet.pdf', key), { as: foreman });
    expect(answer.status).toBe(200);
    expect(answer.headers['content-type']).toBe('application/pdf');
    expect(answer.headers['content-disposition']).toContain('shift-north-2026-03-09-');
    return answer.body as Buffer;
  };

  it('says what the screen says: every figure of every loom, the shed’s, who closed it and with what words', async () => {
    const sheet = await sheetOf();
    const words = await pdfWords(await pdfOf());
    const page = lines(words);
    for (const row of sheetRows(sheet)) {
      const line = page.find(({ text }) => text.startsWith(`${row.loom} ${row.cloth || 'no cloth'} `));
      expect(line?.text, `loom ${row.loom}`).toContain(figuresInOrder(row.figures));
      for (const { words: flag } of row.flags) expect(said(words)).toContain(bare(flag));
    }
    const total = page.find(({ text }) => text.startsWith('The shed '));
    expect(total?.text).toContain(figuresInOrder(totalFigures(sheet)));
    expect(said(words)).toContain(bare(sheetTotalWords(sheet)));
    expect(said(words)).toContain(bare('Handover: “Watch loom 2: the let-off slips”'));
    expect(said(words)).toContain('14:01byFredTest');
  });

  it('is A4, lying, and draws the strips as lines, not as pictures', async () => {
    const pdf = Buffer.from(await pdfOf()).toString('latin1');
    expect(pdf).toMatch(/MediaBox \[0 0 841\.89 595\.28\]/);
    expect(pdf).not.toContain('/Subtype /Image');
  });

  it('is there for a shift that still runs, and says that it is not closed', async () => {
    const words = said(await pdfWords(await pdfOf(LATE)));
    expect(words).toContain(bare('Not closed; as of'));
  });

  it('repeats the heads on every page, cuts no row, and leaves no loom out: 120 looms', async () => {
    const sheet = await sheetOf();
    const [one] = sheet.lines;
    if (!one) throw new Error('The shift has lines.');
    const many = Array.from({ length: 120 }, (_, i) => ({
      ...one,
      loomNumber: 1_001 + i,
      line: { ...one.line, loomId: `m${i}` },
    }));
    const words = await pdfWords(await makePdf(sheetDocument({ ...sheet, lines: many }, PRINT)));
    const pages = Math.max(...words.map((word) => word.page));
    expect(pages).toBeGreaterThan(3);
    const page = lines(words);
    for (const { loomNumber } of many)
      expect(page.filter(({ text }) => text.startsWith(`${loomNumber} `))).toHaveLength(1);
    for (let n = 1; n <= pages; n++) {
      const here = page.filter((line) => line.page === n);
      const rows = here.filter(({ text }) => /^1\d{3} /.test(text));
      if (rows.length === 0) continue;
      expect(
        here.some(({ text }) => text.includes('Efficiency')),
        `heads of page ${n}`,
      ).toBe(true);
      // Every row has its second line (the weaver) beneath it on the same page.
      expect(here.filter(({ text }) => text.startsWith('Wanda')).length).toBe(rows.length);
      expect(here.some(({ text }) => text.includes(`page ${n} of ${pages}`))).toBe(true);
    }
  });

  it('does not exist for no shift, nor for who may not see the shed', async () => {
    const missing = await server.call('get', path('sheet.pdf', 'north:2026-03-09:none'), { as: foreman });
    expect(missing.status).toBe(404);
    const weaver = await server.signInAs('weaver');
    const refused = await server.call('get', path('sheet.pdf'), { as: weaver });
    expect(refused.status).toBe(403);
  });
});

interface Line {
  readonly page: number;
  readonly text: string;
}

/** Words that stand on one level, from left to right. */
function lines(words: readonly PdfWord[]): Line[] {
  const levels = new Map<string, PdfWord[]>();
  for (const word of words) {
    const near = [...levels.keys()].find((key) => {
      const [page = 0, y = 0] = key.split(' ').map(Number);
      return page === word.page && Math.abs(y - word.y) < 2.2;
    });
    const key = near ?? `${word.page} ${word.y}`;
    levels.set(key, [...(levels.get(key) ?? []), word]);
  }
  return [...levels.values()].map((level) => ({
    page: level[0]?.page ?? 0,
    text: [...level]
      .sort((a, b) => a.x - b.x)
      .map(({ text }) => text.trim())
      .join(' '),
  }));
}

/** All of it without its spaces: where lines are broken is the page's own matter. */
const said = (words: readonly PdfWord[]) => bare(words.map(({ text }) => text).join(''));
const bare = (text: string) => text.replace(/\s+/g, '');

/** The row's figures as they stand from left to right. */
function figuresInOrder(figures: SheetFigures): string {
  const { picks, efficiency, picksPerHour, warp, weft, measured, estimated, unaccounted } = figures;
  const cells: readonly Cell[] = [
    picks,
    efficiency,
    picksPerHour,
    warp,
    weft,
    measured,
    estimated,
    unaccounted,
  ];
  return cells.map(({ text }) => text).join(' ');
}
