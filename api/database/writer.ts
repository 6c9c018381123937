import type { DataSource, EntityManager } from 'typeorm';
import PQueue from 'p-queue';

/**
 * The one writer. TypeORM's SQLite driver has one connection and one query runner: two transactions at once would be
 * one, and acknowledged rows would vanish when a neighbour rolls back. So every write goes through here, first in,
 * first out, each in a transaction of its own; whatever decides a result is read inside it.
 */
export class Writer {
  private readonly queue = new PQueue({ concurrency: 1 });
  private closed = false;

  constructor(private readonly dataSource: DataSource) {}

  /** How many wait, the running one included. */
  get waiting(): number {
    return this.queue.size + this.queue.pending;
  }

  /** Whether it takes nothing more. */
  get closing(): boolean {
    return this.closed;
  }

  /** Runs `work` in one transaction after all that were asked before; commits before it resolves. */
  async write<T>(work: (tx: EntityManager) => Promise<T>, options: { priority?: number } = {}): Promise<T> {
    return this.inTurn(() => this.dataSource.transaction(work), options.priority ?? 0);
  }

  /** Runs `work` alone on the writer's connection, outside a transaction (backup, checkpoint). */
  async exclusive<T>(work: (dataSource: DataSource) => Promise<T>): Promise<T> {
    return this.inTurn(() => work(this.dataSource), 0);
  }

  /** Takes nothing new, finishes what waits. */
  async close(): Promise<void> {
    this.closed = true;
    await this.queue.onIdle();
  }

  /** The queue's own answer may be empty (it knows time limits), so the result is carried beside it. */
  private async inTurn<T>(work: () => Promise<T>, priority: number): Promise<T> {
    if (this.closed) throw new WriterClosed();
    return new Promise<T>((resolve, reject) => {
      void this.queue.add(() => work().then(resolve, reject), { priority });
    });
  }
}

/** The server is closing down; nothing was written. */
export class WriterClosed extends Error {
  constructor() {
    super('The writer takes nothing more: the server is closing down.');
  }
}
