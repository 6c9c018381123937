import type { Worker } from 'node:worker_threads';
import { startWorker } from '../../worker.js';
import type { ReportAnswer, ReportJob } from './report-worker.js';
import type { ReportReader, Reports } from './report-reader.js';

interface Waiting {
  readonly resolve: (answer: unknown) => void;
  readonly reject: (error: Error) => void;
}

/** Reports in a worker thread with a read-only connection of its own, started at the first need. */
export function createReportReader(file: string): ReportReader {
  const waiting = new Map<number, Waiting>();
  let worker: Worker | null = null;
  let count = 0;

  function fail(error: Error): void {
    worker = null;
    for (const each of waiting.values()) each.reject(error);
    waiting.clear();
  }

  function start(): Worker {
    const made = startWorker('./report-worker', import.meta.url, { file });
    made.on('message', ({ id, answer, error }: ReportAnswer) => {
      const asked = waiting.get(id);
      waiting.delete(id);
      if (error === undefined) asked?.resolve(answer);
      else asked?.reject(new Error(error));
      if (waiting.size === 0) made.unref();
    });
    made.on('error', fail);
    made.on('exit', () => fail(new Error('The report worker ended.')));
    return made;
  }

  return {
    run: <R extends keyof Reports>(report: R, input: Reports[R]['input']) => {
      worker ??= start();
      worker.ref();
      const job: ReportJob = { id: ++count, report, input };
      return new Promise<Reports[R]['answer']>((resolve, reject) => {
        // The worker answers a job with its own report's answer.
        waiting.set(job.id, { resolve: (answer) => resolve(answer as Reports[R]['answer']), reject });
        worker?.postMessage(job);
      });
    },
    close: async () => {
      await worker?.terminate();
    },
  };
}
