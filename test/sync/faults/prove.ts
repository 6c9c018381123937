import { runFaults } from './run';
import { NO_SABOTAGE, SABOTAGES, type SabotageName } from './sabotage';

export interface Proof {
  runs: number;
  entries: number;
  faults: number;
  lost: number;
  doubled: number;
  misattributed: number;
  unseen: number;
  seconds: number;
}

export interface ProofOptions {
  readonly runs: number;
  /** The first run's; each next one's is one more. */
  readonly seed: number;
  readonly template: string;
  readonly sabotage?: SabotageName | undefined;
  readonly say?: (line: string) => void;
}

/** Many runs, summed up. A run with anything lost says its seed. */
export async function proveRuns({ runs, seed, template, sabotage, say }: ProofOptions): Promise<Proof> {
  const began = performance.now();
  const sum: Proof = {
    runs: 0,
    entries: 0,
    faults: 0,
    lost: 0,
    doubled: 0,
    misattributed: 0,
    unseen: 0,
    seconds: 0,
  };
  for (let n = seed; n < seed + runs; n++) {
    const verdict = await runFaults(n, template, sabotage ? SABOTAGES[sabotage] : NO_SABOTAGE);
    sum.runs++;
    for (const key of ['entries', 'faults', 'lost', 'doubled', 'misattributed', 'unseen'] as const)
      sum[key] += verdict[key];
    for (const detail of verdict.details) say?.(`seed ${n}: ${detail}`);
    // A sabotage is caught or not; how often is nobody's question.
    if (sabotage && verdict.details.length > 0) break;
  }
  sum.seconds = Math.round((performance.now() - began) / 100) / 10;
  return sum;
}
