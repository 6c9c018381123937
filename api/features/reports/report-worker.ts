import { parentPort, workerData } from 'node:worker_threads';
import { createDataSource } from '../../database/data-source.js';
import type { WorkerStart } from '../../worker.js';
import type { Reports } from './report-reader.js';
import { runReport } from './run-report.js';

/** Runs reports where they may take their time: SQLite's queries are synchronous and would stall the taps. */

export interface ReportJob {
  readonly id: number;
  readonly report: keyof Reports;
  readonly input: Reports[keyof Reports]['input'];
}

export interface ReportAnswer {
  readonly id: number;
  readonly answer?: unknown;
  readonly error?: string;
}

const { file } = (workerData as WorkerStart<{ file: string }>).data;
const opened = createDataSource(file, { readonly: true }).initialize();

async function answer({ id, report, input }: ReportJob): Promise<ReportAnswer> {
  try {
    const reads = await opened;
    // One transaction, so that all of a report is of one moment.
    const found = await reads.transaction((from) => runReport(from, report, input));
    return { id, answer: found };
  } catch (error) {
    return { id, error: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

// One at a time: the connection has one transaction.
let last: Promise<unknown> = Promise.resolve();
parentPort?.on('message', (job: ReportJob) => {
  last = last.then(async () => parentPort?.postMessage(await answer(job)));
});
