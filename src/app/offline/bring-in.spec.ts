import { TestBed } from '@angular/core/testing';
import type { Answer } from '../core/answer';
import { ApiClient } from '../core/api-client';
import type { BringInResponse } from '@shared/contract/sync';
import { BringIn } from './bring-in';
import { exportFile } from './export-file';
import { numberEntry } from './entry-draft';
import { newOutboxRecord } from './records';
import { anUnnumbered, MORNING } from '../testing/entry-builders';
import { OFFLINE } from '../testing/scripted-server';

function setUp(answers: Answer<BringInResponse>[]) {
  const sent: number[] = [];
  const api = {
    post: (_path: string, _answer: unknown, body: { entries: unknown[] }) => {
      sent.push(body.entries.length);
      return Promise.resolve(answers.shift() ?? OFFLINE);
    },
  };
  TestBed.configureTestingModule({ providers: [{ provide: ApiClient, useValue: api }] });
  return { bringIn: TestBed.inject(BringIn), sent };
}

const exported = (count: number) => {
  const records = Array.from({ length: count }, (_, n) =>
    newOutboxRecord(numberEntry(anUnnumbered(), n + 1), MORNING),
  );
  return exportFile(records, MORNING).text();
};
const ok = (results: BringInResponse['results']): Answer<BringInResponse> => ({
  kind: 'ok',
  body: { results },
});

describe('a file that another device exported', () => {
  it('is handed in, and what became of each entry is summed up', async () => {
    const { bringIn, sent } = setUp([
      ok([
        { id: 'a', index: 0, result: 'stored' },
        { id: 'b', index: 1, result: 'duplicate' },
        { id: 'c', index: 2, result: 'held', hold: 'shift-closed' },
        { id: 'd', index: 3, result: 'refused', code: 'loom-unknown' },
      ]),
    ]);
    const brought = await bringIn.file(await exported(4));
    expect(sent).toEqual([4]);
    expect(brought).toMatchObject({ inBook: 2, stopped: null });
    expect(brought?.others.map(({ why, count }) => [why.split('.')[0], count])).toEqual([
      ['The shift was closed before this came', 1],
      ['The book has no such loom', 1],
    ]);
  });

  it('goes in parts of 500; where the network ends it says so, with what is in', async () => {
    const many = Array.from({ length: 500 }, (_, index) => ({ id: null, index, result: 'stored' as const }));
    const { bringIn, sent } = setUp([ok(many)]);
    const brought = await bringIn.file(await exported(501));
    expect(sent).toEqual([500, 1]);
    expect(brought?.inBook).toBe(500);
    expect(brought?.stopped).toMatch(/cannot be reached/);
  });

  it.each(['', 'not JSON', '[]', '{"format":"something else","entries":[]}'])('is not: %s', async (text) => {
    const { bringIn, sent } = setUp([]);
    expect(await bringIn.file(text)).toBeNull();
    expect(sent).toEqual([]);
  });
});
