import { parentPort } from 'node:worker_threads';
import bcrypt from 'bcryptjs';

/** Runs bcrypt where it may take its time: 24 compares on the main thread stopped all taps for 1.9 s. */

export type BcryptTask =
  | { readonly do: 'hash'; readonly secret: string; readonly cost: number }
  | { readonly do: 'compare'; readonly secret: string; readonly hash: string };

export interface BcryptJob {
  readonly id: number;
  readonly task: BcryptTask;
}

parentPort?.on('message', ({ id, task }: BcryptJob) => {
  try {
    const result =
      task.do === 'hash'
        ? bcrypt.hashSync(task.secret, task.cost)
        : bcrypt.compareSync(task.secret, task.hash);
    parentPort?.postMessage({ id, result });
  } catch (error) {
    parentPort?.postMessage({ id, error: error instanceof Error ? error.message : String(error) });
  }
});
