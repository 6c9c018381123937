import { fileURLToPath } from 'node:url';
import { Worker } from 'node:worker_threads';

/** Node 20 does not take `--import tsx` in a worker's execArgv to heart, so the worker registers tsx itself. */
const UNDER_TSX = `
  const { workerData } = require('node:worker_threads');
  import(workerData.tsx).then(({ register }) => { register(); return import(workerData.url); });
`;

/** What a worker module finds as `workerData`. */
export interface WorkerStart<T> {
  readonly data: T;
}

/**
 * Starts a worker thread from a module named without extension, beside the caller: the TypeScript file under tsx and
 * vitest, the compiled one in a build. The module finds what it was given as `workerData.data`.
 *
 *     startWorker('./bcrypt-worker', import.meta.url, { … })
 */
export function startWorker(module: string, callersUrl: string, data: unknown): Worker {
  const source = callersUrl.endsWith('.ts');
  const url = new URL(`${module}${source ? '.ts' : '.js'}`, callersUrl);
  if (!source) return new Worker(url, { workerData: { data } });
  return new Worker(UNDER_TSX, {
    eval: true,
    workerData: { data, url: url.href, tsx: import.meta.resolve('tsx/esm/api') },
    execArgv: [],
    // tsx compiles decorators only if it is told which tsconfig asks for them.
    env: { ...process.env, TSX_TSCONFIG_PATH: fileURLToPath(new URL('./tsconfig.json', import.meta.url)) },
  });
}
