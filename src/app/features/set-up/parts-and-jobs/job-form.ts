import { FormControl, FormGroup } from '@angular/forms';
import type { Job, LoomVersion, Part } from '@shared/contract/reference';
import { jobFormSchema, partFormSchema } from '@shared/contract/set-up';
import { formatCount } from '@shared/figures/format';
import { field } from '../common/field';
import { nameFree } from '../common/name-taken';

export const JOB_LABELS = { name: 'Job', everyPicks: 'Due again after' } as const;
export const PART_LABELS = { name: 'Part' } as const;

/** A job of care, empty or as stored. */
export function jobForm(job: Job | null, others: () => readonly string[]) {
  return new FormGroup({
    name: field(jobFormSchema.shape.name, job?.name ?? '', [nameFree(others)]),
    everyPicks: field<number | null>(jobFormSchema.shape.everyPicks, job?.everyPicks ?? null),
    retired: new FormControl(job?.retired ?? false, { nonNullable: true }),
  });
}

/** A spare part, empty or as stored. */
export function partForm(part: Part | null, others: () => readonly string[]) {
  return new FormGroup({
    name: field(partFormSchema.shape.name, part?.name ?? '', [nameFree(others)]),
    retired: new FormControl(part?.retired ?? false, { nonNullable: true }),
  });
}

/** How long so many picks are on the mill's looms: "about 520 running hours at 160 ppm"; empty: no loom, no picks. */
export function picksInHours(picks: number | null, versions: readonly Pick<LoomVersion, 'ppm'>[]): string {
  const speeds = versions.map(({ ppm }) => ppm).sort((a, b) => a - b);
  const ppm = speeds[Math.floor(speeds.length / 2)];
  if (ppm === undefined || picks === null) return '';
  const hours = picks / ppm / 60;
  const words =
    hours < 2 ? `${Math.round(hours * 60)} running minutes` : `${formatCount(hours)} running hours`;
  return `about ${words} at ${formatCount(ppm)} ppm`;
}
