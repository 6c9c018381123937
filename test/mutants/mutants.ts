/**
 * Wrong figures made on purpose, each a slip that a person could make. `npm run mutants` puts them in one at a time and
 * runs the specs named: one of them must fail. A mutant that survives is a figure that no spec holds.
 */
export interface Mutant {
  /** Below shared/. */
  readonly file: string;
  /** Stands exactly once in the file. */
  readonly original: string;
  readonly mutated: string;
  /** What would be wrong. */
  readonly why: string;
  /** Spec files that should notice, as parts of their paths; unless said the one beside the file. */
  readonly specs?: readonly string[];
}

const FIGURES: readonly Mutant[] = [
  {
    file: 'figures/pick-clock.ts',
    original: '((end - start + range) % range) * clock.unit',
    mutated: '(end - start) * clock.unit',
    why: 'a clock that rolled over gives negative picks',
  },
  {
    file: 'figures/pick-clock.ts',
    original: 'possible * SPEED_TOLERANCE + unit',
    mutated: 'possible * SPEED_TOLERANCE',
    why: 'a clock of thousands asks about honest readings',
  },
  {
    file: 'figures/efficiency.ts',
    original: 'if (!(denominator > 0)) return noFigure(whenZero);',
    mutated: 'if (denominator < 0) return noFigure(whenZero);',
    why: 'no time to weave in gives another reason',
  },
  {
    file: 'figures/totals.ts',
    original: 'efficiency(picks, atSpeed(totals.possibleLessShed))',
    mutated: 'efficiency(picks, atSpeed(totals.possibleScheduled))',
    why: 'weavers are shown an efficiency that a power cut lowers',
  },
  {
    file: 'figures/totals.ts',
    original: 'picksPerHour(picks, runningMinutes)',
    mutated: 'picksPerHour(picks, totals.minutes)',
    why: 'picks per running hour count standing hours',
  },
  {
    file: 'figures/totals.ts',
    original: " && line.picksBy !== 'agreed'",
    mutated: '',
    why: 'agreed picks count in statistics',
  },
  {
    file: 'figures/totals.ts',
    original: 'Math.max(0, possiblePicks - measuredPicks - estimatedPicks)',
    mutated: 'Math.max(0, possiblePicks - measuredPicks)',
    why: '“at most” forgets the taps',
  },
  {
    file: 'figures/line-sums.ts',
    original: 'less(this.possible, this.atSpeed.planned)',
    mutated: 'less(this.possible, 0)',
    why: 'planned stands lower the efficiency on scheduled time',
    specs: ['figures/loom-line.spec'],
  },
  {
    file: 'figures/line-sums.ts',
    original: 'sum + ms * ppm',
    mutated: 'sum + ms * 180',
    why: 'stretches are all reckoned at one speed',
    specs: ['figures/loom-line.spec'],
  },
  {
    file: 'figures/loom-line.ts',
    original: 'if (Object.hasOwn(line.handOverCounts, stop.cause)) continue;',
    mutated: '',
    why: 'perns that were tapped and counted at hand-over count twice',
    specs: ['entries/line-counts.spec'],
  },
  {
    file: 'figures/loom-line.ts',
    original: 'const begun = line.stops.filter((stop) => stop.from <= asOf);',
    mutated: 'const begun = line.stops;',
    why: 'a running shift has lost what is still to come',
    specs: ['figures/running-shift.spec'],
  },
  {
    file: 'figures/standing-time.ts',
    original: 'a.rank - b.rank || a.began - b.began',
    mutated: 'a.began - b.began || a.rank - b.rank',
    why: 'a planned stand has no precedence over what began before it',
  },
  {
    file: 'figures/standing-time.ts',
    original: 'Math.min(phase.until ?? Infinity, window.until)',
    mutated: 'phase.until ?? window.until',
    why: 'minutes of a stop are not divided at the shift’s end',
  },
  {
    file: 'figures/standing-time.ts',
    original: "return shedWide || group === 'shed' ? 'shed' : 'own';",
    mutated: "return group === 'shed' ? 'shed' : 'own';",
    why: 'a stop of the whole shed is laid to the loom',
  },
  {
    file: 'figures/lost-time.ts',
    original: 'minus(minus(lost, measured), estimated)',
    mutated: 'minus(lost, measured)',
    why: 'estimated stops are lost twice, as unaccounted too',
  },
  {
    file: 'figures/breaks.ts',
    original: 'const scale = BREAKS_PER / picks;',
    mutated: 'const scale = rate;',
    why: 'the interval of the count is not that of the rate',
  },
  {
    file: 'figures/breaks.ts',
    original: 'count * BREAKS_PER * 1000',
    mutated: 'count * BREAKS_PER',
    why: 'breaks are per end, not per thousand',
  },
  {
    file: 'figures/cloth.ts',
    original: 'clothM * (1 + crimp)',
    mutated: 'clothM / (1 - crimp)',
    why: 'crimp is taken for take-up',
  },
  {
    file: 'figures/cloth.ts',
    original: 'lengthM - usedM - thrumM',
    mutated: 'lengthM - usedM',
    why: 'the thrum is thought to be woven',
  },
  {
    file: 'figures/crimp.ts',
    original: 'takeUp / (1 - takeUp)',
    mutated: 'takeUp / (1 + takeUp)',
    why: 'the form shows a wrong crimp beside a take-up',
  },
  {
    file: 'figures/weft.ts',
    original: '(reedWidthCm / 100) * (1 + waste)',
    mutated: '(reedWidthCm / 100 / (1 - waste))',
    why: 'waste is reckoned of the whole instead of what is woven in',
  },
  {
    file: 'figures/yarn.ts',
    original: '(YARDS_PER_LEA * METRES_PER_YARD)',
    mutated: '(YARDS_PER_HANK * METRES_PER_YARD)',
    why: 'a lea is taken for a hank',
  },
  {
    file: 'figures/shop-floor.ts',
    original: '(plannedMinutesPerItem * produced) / actualProductionMinutes',
    mutated: '(plannedMinutesPerItem * produced) / plannedBusyMinutes',
    why: 'effectiveness counts standing, which availability has counted',
  },
];

const ENTRIES: readonly Mutant[] = [
  {
    file: 'entries/corrections.ts',
    original: 'counted.filter((book) => !overtaken.has(book))',
    mutated: 'counted',
    why: 'a correction that its author saw and corrected wins by its clock',
  },
  {
    file: 'entries/stands.ts',
    original: 'a.at - b.at || byMoment(a.root, b.root)',
    mutated: 'b.at - a.at || byMoment(a.root, b.root)',
    why: 'the later of two Runnings ends a stop',
  },
  {
    file: 'entries/phases.ts',
    original: "present = mark.to === 'arrived';",
    mutated: "present = mark.to !== 'left';",
    why: 'waiting for the tackler is laid to the tackler',
  },
  {
    file: 'entries/line-stops.ts',
    original: "beganHere ? (entry.kind === 'stop' ? entry.count : 1) : 0",
    mutated: "entry.kind === 'stop' ? entry.count : 1",
    why: 'a stop across three shifts counts in each',
  },
  {
    file: 'entries/line-stops.ts',
    original: 'estimatedMs: inside ? 0 :',
    mutated: 'estimatedMs:',
    why: 'a tap inside a timed stop costs its time twice',
  },
  {
    file: 'entries/line-stops.ts',
    original: 'causeId === PERN_CHANGE && battery ? 0 :',
    mutated: '',
    why: 'a battery loom loses time by its perns',
  },
  {
    file: 'entries/line-counts.ts',
    original: 'counts.set(entry.cause, entry.total)',
    mutated: 'counts.set(entry.cause, (counts.get(entry.cause) ?? 0) + entry.total)',
    why: 'a count said again is added instead of put right',
  },
  {
    file: 'entries/boundary-readings.ts',
    original: 'decided ?? (rivals ? null : (nearest ?? null))',
    mutated: 'decided ?? nearest ?? null',
    why: 'readings that disagree give picks before anybody decides',
  },
  {
    file: 'entries/boundary-readings.ts',
    original: '> LIMITS.readingOffBoundary',
    mutated: '> 2 * LIMITS.readingOffBoundary',
    why: 'picks of ten minutes more or less are held against the shift’s length',
  },
  {
    file: 'entries/line-readings.ts',
    original: 'sum += picks;',
    mutated: 'sum = picks;',
    why: 'picks before a reset are lost',
    specs: ['entries/clock-resets.spec'],
  },
  {
    file: 'entries/line-readings.ts',
    original: 'one.entry.shiftKey === shift.key && ',
    mutated: '',
    why: 'picks agreed for another shift are paid for this one',
    specs: ['entries/line-readings.spec', 'entries/boundary-readings.spec'],
  },
  {
    file: 'entries/stretches.ts',
    original: 'running.filter((ms) => ms > 0).length > 1',
    mutated: 'running.filter((ms) => ms > 0).length > 2',
    why: 'picks shared between two weavers pass as read',
  },
  {
    file: 'entries/weavers.ts',
    original: 'if (weaverId === null && by !== minds && minded.has(by)) continue;',
    mutated: '',
    why: 'a late hand-over takes the loom from who minds it now',
  },
  {
    file: 'entries/projection.ts',
    original: 'unaccounted < -unit',
    mutated: 'unaccounted < -unit * 1000',
    why: 'over-logging goes by unseen',
    specs: ['entries/line-flags.spec'],
  },
];

const CHANCE: readonly Mutant[] = [
  {
    file: 'chance/poisson-interval.ts',
    original: '2 * effective + 2)',
    mutated: '2 * effective)',
    why: 'the upper limit belongs to one break fewer',
  },
  {
    file: 'chance/poisson-interval.ts',
    original: 'const effective = count / dispersion;',
    mutated: 'const effective = count;',
    why: 'an over-dispersed count is moved, not widened',
  },
  {
    file: 'chance/two-rates.ts',
    original: 'weight <= weights[x] * TIE',
    mutated: 'weight < weights[x]',
    why: 'p leaves out what was seen',
  },
  {
    file: 'chance/over-dispersion.ts',
    original: 'degrees += woven.length - 1;',
    mutated: 'degrees += woven.length;',
    why: 'dispersion comes out too small, so pages cry wolf',
  },
  {
    file: 'chance/over-dispersion.ts',
    original: 'dispersion: Math.max(1, asFound)',
    mutated: 'dispersion: asFound',
    why: 'a calm week makes intervals narrower than Poisson',
  },
  {
    file: 'chance/quasi-poisson.ts',
    original: 'Math.max(0, statistic) / dispersion',
    mutated: 'Math.max(0, statistic)',
    why: 'the comparison forgets the dispersion',
  },
  {
    file: 'chance/quasi-poisson.ts',
    original: 'above / othersBelow',
    mutated: 'othersBelow / above',
    why: 'limits of the ratio are turned over',
  },
  {
    file: 'chance/false-discovery.ts',
    original: '(p[at] * p.length) / (p.length - k)',
    mutated: '(p[at] * p.length) / (k + 1)',
    why: 'ranks are counted from the wrong end',
  },
  {
    file: 'chance/two-weeks.ts',
    original: 'bothWove && warpsOf(weeks.before) !== warpsOf(weeks.after)',
    mutated: 'false',
    why: 'a new warp is judged as a change of the loom',
  },
  {
    file: 'chance/control-charts.ts',
    original: '3 * widening * Math.sqrt(centre / exposure)',
    mutated: '3 * Math.sqrt(centre / exposure)',
    why: 'limits are not widened',
  },
  {
    file: 'chance/control-charts.ts',
    original: 'value > high + slack',
    mutated: 'value >= high',
    why: 'a point exactly on its limit is out',
    specs: ['chance/control-charts.spec', 'nist-c-chart.spec'],
  },
  {
    file: 'chance/individuals-chart.ts',
    original: 'const sigma = meanRange / D2;',
    mutated: 'const sigma = meanRange;',
    why: 'limits of an efficiency over time are too wide',
  },
  {
    file: 'chance/run-rules.ts',
    original: 'least: 4, of: 5',
    mutated: 'least: 3, of: 5',
    why: 'a run rule calls on three of five',
    specs: ['chance/run-rules.spec', 'nist-run-rules.spec'],
  },
  {
    file: 'chance/enough.ts',
    original: '(dispersion * z ** 2)',
    mutated: 'z ** 2',
    why: 'too little is said to be enough',
  },
];

const SETS_AND_AHEAD: readonly Mutant[] = [
  {
    file: 'looms-per-weaver/interference.ts',
    original: '((looms - n) * rho) / Math.min(n + 1, weavers)',
    mutated: '(looms * rho) / Math.min(n + 1, weavers)',
    why: 'looms that stand go on stopping',
  },
  {
    file: 'looms-per-weaver/interference.ts',
    original: 'Math.log((looms - j) / j)',
    mutated: 'Math.log((looms - j + 1) / j)',
    why: 'Ashcroft is reckoned for one loom more',
    specs: ['looms-per-weaver/interference.spec', 'ashcroft-1950.spec'],
  },
  {
    file: 'looms-per-weaver/attending-time.ts',
    original: 'runningMinutes / (runningMinutes + standingMinutes)',
    mutated: '1 - standingMinutes / runningMinutes',
    why: 'attending time is solved from a wrong efficiency',
  },
  {
    file: 'looms-per-weaver/set-of-looms.ts',
    original: 'rho / (1 - added(efficiency))',
    mutated: 'rho * (1 + added(efficiency))',
    why: 'patrol and filling slow the mending too little',
  },
  {
    file: 'ahead/warp-out.ts',
    original: '(left - thrum) / (1 + crimp)',
    mutated: 'left / (1 + crimp)',
    why: 'the thrum is thought to be woven',
  },
  {
    file: 'ahead/warp-out.ts',
    original: 'const pace = (shift.hours ?? length) / length;',
    mutated: 'const pace = 1;',
    why: 'a warp runs out during meals with the looms stopped',
  },
  {
    file: 'ahead/weft-ahead.ts',
    original: 'weftOfPicks(picks * share, own, own.reedWidthCm)',
    mutated: 'weftOfPicks(picks, own, own.reedWidthCm)',
    why: 'each of several wefts is ordered for all picks',
  },
];

export const MUTANTS: readonly Mutant[] = [...FIGURES, ...ENTRIES, ...CHANCE, ...SETS_AND_AHEAD];

/** The specs that should notice a mutant. */
export function specsOf({ file, specs }: Mutant): readonly string[] {
  return specs ?? [`shared/${file.replace(/\.ts$/, '.spec')}`];
}

/** A file's text with the mutant in it; throws where the original does not stand in it exactly once. */
export function mutate(text: string, { file, original, mutated }: Mutant): string {
  const [before, after, ...more] = text.split(original);
  if (before === undefined || after === undefined || more.length > 0)
    throw new Error(
      `shared/${file}: stands there ${more.length + (after === undefined ? 0 : 1)} times: ${original}`,
    );
  return before + mutated + after;
}
