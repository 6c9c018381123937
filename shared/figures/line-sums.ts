import type { Standing } from './standing-time.js';

const MINUTE = 60_000;

/** Adds a line up in whole milliseconds, so that the order of adding changes nothing. */
export class LineSums {
  private ms = 0;
  private possible: number | null = 0;
  private readonly stood = { planned: 0, shed: 0, own: 0 };
  private readonly standing = { measured: 0, estimated: 0 };
  private readonly atSpeed: Record<Standing['as'] | 'measured' | 'estimated', number | null> = {
    planned: 0,
    shed: 0,
    own: 0,
    measured: 0,
    estimated: 0,
  };
  private readonly byCause = new Map<string, { measured: number; estimated: number }>();

  run(ms: number, ppm: number | null): void {
    this.ms += ms;
    this.possible = plus(this.possible, ms, ppm);
  }

  stand(
    cause: string,
    as: Standing['as'],
    ms: number,
    ppm: number | null,
    how: 'measured' | 'estimated',
  ): void {
    if (ms <= 0) return;
    this.stood[as] += ms;
    this.standing[how] += ms;
    this.atSpeed[as] = plus(this.atSpeed[as], ms, ppm);
    this.atSpeed[how] = plus(this.atSpeed[how], ms, ppm);
    const lost = this.byCause.get(cause) ?? { measured: 0, estimated: 0 };
    this.byCause.set(cause, { ...lost, [how]: lost[how] + ms });
  }

  measuredMs(cause: string): number {
    return this.byCause.get(cause)?.measured ?? 0;
  }

  /** Mean speed, for what has no moment of its own. */
  meanPpm(): number | null {
    return this.possible === null || this.ms === 0 ? null : this.possible / this.ms;
  }

  totals() {
    const picks = (pickMs: number | null) => (pickMs === null ? null : pickMs / MINUTE);
    const less = (a: number | null, b: number | null) => (a === null || b === null ? null : a - b);
    const scheduled = less(this.possible, this.atSpeed.planned);
    const causes = [...this.byCause].sort(([a], [b]) => (a < b ? -1 : 1));
    return {
      minutes: this.ms / MINUTE,
      plannedMinutes: this.stood.planned / MINUTE,
      shedStopMinutes: this.stood.shed / MINUTE,
      stopMinutes: (this.standing.measured + this.standing.estimated) / MINUTE,
      measuredMinutes: this.standing.measured / MINUTE,
      estimatedMinutes: this.standing.estimated / MINUTE,
      possiblePicks: picks(this.possible),
      possibleScheduled: picks(scheduled),
      possibleLessShed: picks(less(scheduled, this.atSpeed.shed)),
      measuredPicks: picks(this.atSpeed.measured),
      estimatedPicks: picks(this.atSpeed.estimated),
      minutesByCause: Object.fromEntries(
        causes.map(([cause, ms]) => [
          cause,
          { measured: ms.measured / MINUTE, estimated: ms.estimated / MINUTE },
        ]),
      ),
    };
  }
}

function plus(sum: number | null, ms: number, ppm: number | null): number | null {
  if (ms === 0) return sum;
  return sum === null || ppm === null ? null : sum + ms * ppm;
}
