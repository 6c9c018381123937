import type { OutboxRecord } from './records';

/** Everything that is not in the book, as a JSON file that a person can keep, mail or show. */
export function exportFile(records: readonly OutboxRecord[], now: number): Blob {
  const content = {
    format: 'shedbeat.waiting-entries.1',
    exportedAt: new Date(now).toISOString(),
    entries: records.map(({ entry, state, code, detail, hold }) => ({ state, code, detail, hold, entry })),
  };
  return new Blob([JSON.stringify(content, null, 2)], { type: 'application/json' });
}
