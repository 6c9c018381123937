import type { Mutant } from './mutant.js';

export const CHANCE: readonly Mutant[] = [
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

export const SETS_AND_AHEAD: readonly Mutant[] = [
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
