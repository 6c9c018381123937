import type { Job, LoomVersion } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';
import { PLAIN, nameProblem, readWithin } from '../cloths/typed';

/** A job of care as typed. */
export interface JobValues {
  readonly name: string;
  readonly everyPicks: string;
}

export interface JobReading {
  readonly job: Pick<Job, 'name' | 'everyPicks'> | null;
  readonly problems: Readonly<Partial<Record<keyof JobValues, string>>>;
}

const PICKS = { ...PLAIN, unit: 'picks' };

export function jobValuesOf(job: Pick<Job, 'name' | 'everyPicks'> | null): JobValues {
  return job ? { name: job.name, everyPicks: formatCount(job.everyPicks) } : { name: '', everyPicks: '' };
}

export function readJob(values: JobValues, taken: readonly string[] = []): JobReading {
  const problems: Partial<Record<keyof JobValues, string>> = {};
  const named = nameProblem(values.name, 'the job', taken);
  if (named) problems.name = named;
  const { value, problem } = readWithin(values.everyPicks, PICKS, {
    what: 'the number of picks',
    usual: 5_000_000,
    least: 1_000,
    most: 10_000_000_000,
    whole: true,
  });
  if (problem) problems.everyPicks = problem;
  if (value === null || named) return { job: null, problems };
  return { job: { name: values.name.trim(), everyPicks: value }, problems };
}

/** How long so many picks are on the mill's looms: "about 520 running hours at 160 ppm"; empty: no loom yet. */
export function picksInHours(picks: number, versions: readonly Pick<LoomVersion, 'ppm'>[]): string {
  const speeds = versions.map(({ ppm }) => ppm).sort((a, b) => a - b);
  const ppm = speeds[Math.floor(speeds.length / 2)];
  if (ppm === undefined) return '';
  const hours = picks / ppm / 60;
  const words =
    hours < 2 ? `${Math.round(hours * 60)} running minutes` : `${formatCount(hours)} running hours`;
  return `about ${words} at ${formatCount(ppm)} ppm`;
}
