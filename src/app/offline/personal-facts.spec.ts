import 'fake-indexeddb/auto';
import { signal } from '@angular/core';
import { IDBFactory } from 'fake-indexeddb';
import { LocalDatabase } from './local-database';
import { PersonalFacts } from './personal-facts';

const HOUR = 3_600_000;

describe('PersonalFacts', () => {
  function tablet() {
    const factory = new IDBFactory() as unknown as globalThis.IDBFactory;
    const person = signal<string | null>('ada');
    let now = 0;
    const open = async (longest?: number) => {
      const database = new LocalDatabase(factory);
      const facts = new PersonalFacts<string>(database, 'typed', person, () => now, longest);
      await vi.waitFor(() => expect(facts.ready()).toBe(true));
      return { facts, database };
    };
    return { person, open, passTime: (ms: number) => (now += ms) };
  }
  const onDisk = async (database: LocalDatabase) =>
    JSON.stringify(
      await database.transact(
        ['facts'],
        'readonly',
        (transaction) =>
          new Promise((resolve) => {
            const asked = transaction.objectStore('facts').get('typed');
            asked.onsuccess = () => resolve(asked.result);
          }),
      ),
    );

  it('are each person’s own, and there again after a reload', async () => {
    const { person, open } = tablet();
    const { facts, database } = await open();
    facts.keep('loom-1', '42');
    person.set('bea');
    expect(facts.of('loom-1')).toBeNull();
    facts.keep('loom-1', '7');
    await vi.waitFor(async () => expect(await onDisk(database)).toContain('"7"'));
    const again = await open();
    expect(again.facts.of('loom-1')).toBe('7');
    person.set('ada');
    expect(again.facts.of('loom-1')).toBe('42');
  });

  it('keep nothing of nobody, and forget what is done with or old', async () => {
    const { person, open, passTime } = tablet();
    const { facts, database } = await open();
    facts.keep('done', '1');
    facts.keep('done', null);
    facts.keep('old', '2');
    person.set(null);
    facts.keep('nobody', '3');
    await vi.waitFor(async () => expect(await onDisk(database)).toContain('old'));
    expect(await onDisk(database)).not.toMatch(/nobody|done/);
    passTime(25 * HOUR);
    person.set('ada');
    expect((await open(24 * HOUR)).facts.of('old')).toBeNull();
  });
});
