import type { Worker } from 'node:worker_threads';
import { LIMITS } from '../../../shared/contract/limits.js';
import { ApiError } from '../../middleware/api-error.js';
import { startWorker } from '../../worker.js';
import type { BcryptJob, BcryptTask } from './bcrypt-worker.js';
import type { Passwords } from './passwords.js';

/** bcrypt's cost for passwords and PINs: 2¹⁰ rounds. */
export const BCRYPT_COST = 10;

interface Waiting {
  readonly task: BcryptTask;
  readonly resolve: (result: string | boolean) => void;
  readonly reject: (error: Error) => void;
}

interface Answer {
  readonly id: number;
  readonly result?: string | boolean;
  readonly error?: string;
}

/** `Passwords` in one worker thread, started at the first need. One at a time: sign-ins may queue, taps may not. */
export function createPasswords(cost = BCRYPT_COST): Passwords {
  const waiting = new Map<number, Waiting>();
  let worker: Worker | null = null;
  let count = 0;
  let decoy: Promise<string> | null = null;

  function fail(error: Error): void {
    worker = null;
    for (const each of waiting.values()) each.reject(error);
    waiting.clear();
  }

  function start(): Worker {
    const made = startWorker('./bcrypt-worker', import.meta.url, null);
    made.on('message', ({ id, result, error }: Answer) => {
      const asked = waiting.get(id);
      waiting.delete(id);
      if (result !== undefined) asked?.resolve(result);
      else asked?.reject(new Error(error));
      if (waiting.size === 0) made.unref();
    });
    made.on('error', fail);
    made.on('exit', () => fail(new Error('The password worker ended.')));
    return made;
  }

  function run(task: BcryptTask): Promise<string | boolean> {
    worker ??= start();
    worker.ref();
    const job: BcryptJob = { id: ++count, task };
    return new Promise((resolve, reject) => {
      waiting.set(job.id, { task, resolve, reject });
      worker?.postMessage(job);
    });
  }

  const hash = async (secret: string): Promise<string> => {
    refuseTooLong(secret);
    return String(await run({ do: 'hash', secret, cost }));
  };

  return {
    hash,
    compare: async (secret, known) => {
      refuseTooLong(secret);
      decoy ??= hash('nobody has this secret');
      const same = await run({ do: 'compare', secret, hash: known ?? (await decoy) });
      return same === true && known !== null;
    },
    close: async () => {
      await worker?.terminate();
    },
  };
}

/** bcrypt reads 72 bytes and would silently ignore the rest. */
function refuseTooLong(secret: string): void {
  if (Buffer.byteLength(secret) > LIMITS.passwordBytes) throw new ApiError('password-too-long');
}
