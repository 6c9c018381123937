import { PersonRow, ShedRow } from './entities/index.js';
import { testServer, type TestServer } from '../testing/test-server.js';
import { bookFile } from './prepare-database.js';
import Database from 'better-sqlite3';

describe('the one writer', () => {
  let server: TestServer;
  beforeEach(async () => {
    server = await testServer();
  });
  afterEach(() => server.close());

  const sheds = () => server.deps.reads.query<{ id: string }[]>('SELECT "id" FROM "shed" ORDER BY "id"');

  it('keeps what it acknowledged when a neighbour rolls back', async () => {
    const asked = Array.from({ length: 40 }, (_, index) =>
      server.deps.writer.write(async (tx) => {
        await tx.getRepository(ShedRow).insert({ id: `shed-${index}`, name: 'x' });
        await Promise.resolve();
        if (index % 2) throw new Error('no');
        return index;
      }),
    );
    const settled = await Promise.allSettled(asked);
    const kept = settled.flatMap((each) => (each.status === 'fulfilled' ? [`shed-${each.value}`] : []));
    expect(kept).toHaveLength(20);
    expect((await sheds()).map(({ id }) => id)).toEqual([...kept, 'north', 'south'].sort());
  });

  it('goes first in, first out, and by priority', async () => {
    const order: string[] = [];
    const note = (name: string, priority?: number) =>
      server.deps.writer.write(
        async () => {
          order.push(name);
        },
        priority === undefined ? {} : { priority },
      );
    await Promise.all([note('first'), note('import', -1), note('second'), note('third'), note('urgent', 1)]);
    expect(order).toEqual(['first', 'urgent', 'second', 'third', 'import']);
  });

  it('finishes what waits at closing and takes nothing more', async () => {
    const before = server.deps.writer.write((tx) =>
      tx.getRepository(ShedRow).insert({ id: 'west', name: 'West' }),
    );
    const closing = server.deps.writer.close();
    await expect(server.deps.writer.write(async () => 1)).rejects.toThrow('closing down');
    await Promise.all([before, closing]);
    expect((await sheds()).map(({ id }) => id)).toContain('west');
  });

  it('answers 503 and acknowledges nothing on a full disk', async () => {
    const manager = await server.signInAs('manager');
    let number = 1_000;
    const addSomebody = () =>
      server.call('post', '/people', {
        as: manager,
        body: {
          name: 'N'.repeat(80),
          shortName: String(++number).padStart(80, 'N'),
          worksNumber: String(number),
          email: null,
          roles: ['weaver'],
          shedIds: [],
        },
      });
    const people = server.deps.reads.getRepository(PersonRow);
    await server.deps.writer.exclusive((dataSource) => dataSource.query('PRAGMA max_page_count = 1'));
    let acknowledged = await people.count();
    let answer = await addSomebody();
    for (; answer.status === 200 && acknowledged < 500; answer = await addSomebody()) acknowledged++;
    expect([answer.status, answer.body.code]).toEqual([503, 'disk-full']);
    expect(await people.count()).toBe(acknowledged);

    await server.deps.writer.exclusive((dataSource) => dataSource.query('PRAGMA max_page_count = 1000000'));
    expect((await addSomebody()).status).toBe(200);
    expect(await people.count()).toBe(acknowledged + 1);
  });

  it('answers 503 busy where another program holds the book', async () => {
    const manager = await server.signInAs('manager');
    await server.deps.writer.exclusive((dataSource) => dataSource.query('PRAGMA busy_timeout = 50'));
    const other = new Database(bookFile(server.deps.settings.dataDir));
    other.exec('BEGIN IMMEDIATE');
    const answer = await server.call('patch', '/people/wanda', { as: manager, body: { disabled: true } });
    expect([answer.status, answer.body.code]).toEqual([503, 'busy']);
    expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
    other.exec('ROLLBACK');
    other.close();
    const again = await server.call('patch', '/people/wanda', { as: manager, body: { disabled: true } });
    expect(again.status).toBe(200);
  });

  it('answers 503 closing-down while the server closes', async () => {
    const manager = await server.signInAs('manager');
    await server.deps.writer.close();
    const answer = await server.call('patch', '/people/wanda', { as: manager, body: { disabled: true } });
    expect([answer.status, answer.body.code]).toEqual([503, 'closing-down']);
    expect((await server.call('get', '/health')).body.status).toBe('closing-down');
  });
});
