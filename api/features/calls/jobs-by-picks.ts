import type { EntityManager } from 'typeorm';
import type { LoomHistory } from '../../../shared/contract/calls.js';
import type { ResolvedOf } from '../../../shared/entries/corrections.js';
import { JobRow } from '../../database/entities/index.js';

export type JobState = LoomHistory['jobs'][number];

/**
 * How far each job of care has come on each loom: picks since it was last done, since `since` where the book knows of
 * no such time. The shift in which it was done counts by its share of time.
 *
 * @param cares done since `since`, oldest first
 */
export async function jobsByPicks(
  from: EntityManager,
  loomIds: readonly string[],
  cares: readonly ResolvedOf<'care'>[],
  since: number,
): Promise<ReadonlyMap<string, readonly JobState[]>> {
  const jobs = await from.find(JobRow, { where: { retired: false }, order: { name: 'ASC', id: 'ASC' } });
  const lastAt = new Map(cares.map(({ entry, at }) => [`${entry.loomId} ${entry.jobId}`, at]));
  const asked = loomIds.flatMap((loom) =>
    jobs.map((job) => {
      const at = lastAt.get(`${loom} ${job.id}`) ?? since;
      return { loom, job: job.id, at, date: dayBefore(at) };
    }),
  );
  const rows = await from.query<{ loom: string; job: string; picks: number | null }[]>(
    `SELECT c.value ->> 'loom' AS "loom", c.value ->> 'job' AS "job",
        SUM(l."picks" * MIN(1.0, CAST(s."endsAt" - (c.value ->> 'at') AS real) / (s."endsAt" - s."startsAt"))) AS "picks"
      FROM json_each(?) c
      JOIN "loom_line" l ON l."loomId" = c.value ->> 'loom' AND l."date" >= c.value ->> 'date'
      JOIN "shift" s ON s."key" = l."shiftKey" AND s."endsAt" > c.value ->> 'at'
     GROUP BY 1, 2`,
    [JSON.stringify(asked)],
  );
  const picksOf = new Map(rows.map(({ loom, job, picks }) => [`${loom} ${job}`, picks ?? 0]));
  return new Map(
    loomIds.map((loom) => [
      loom,
      jobs.map(({ id, name, everyPicks }) => ({
        jobId: id,
        name,
        everyPicks,
        picks: Math.round(picksOf.get(`${loom} ${id}`) ?? 0),
        lastAt: lastAt.get(`${loom} ${id}`) ?? null,
      })),
    ]),
  );
}

/** A shift that holds the moment starts on its date or, over midnight and by the mill's clock, on the one before. */
function dayBefore(at: number): string {
  return new Date(at - 86_400_000).toISOString().slice(0, 10);
}
