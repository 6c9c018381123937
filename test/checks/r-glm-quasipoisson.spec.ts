import { describe, expect, it } from 'vitest';
import { fUpperTail } from '../../shared/chance/distributions.js';
import { compareTwoRates } from '../../shared/chance/two-rates.js';
import { compareTwoWeeks } from '../../shared/chance/two-weeks.js';
import { expectClose, given } from './close-to.js';

// R 4.2.2: glm(y ~ week + offset(log(picks)), quasipoisson), anova(…, test = "F"); invented counts of one loom,
// 18 shifts a week.
const BEFORE_BREAKS = [4, 3, 3, 0, 1, 0, 5, 2, 0, 5, 3, 5, 7, 1, 2, 5, 3, 0];
const BEFORE_PICKS = [
  59514, 61326, 64739, 70440, 58429, 70273, 71059, 66234, 65695, 56050, 58502, 58001, 66679, 61530, 68087,
  63461, 67200, 71862,
];
const AFTER_BREAKS = [4, 4, 3, 2, 1, 1, 8, 4, 1, 3, 3, 3, 0, 8, 2, 3, 5, 4];
const AFTER_PICKS = [
  61461, 68217, 70890, 58606, 66078, 57134, 59543, 61564, 55228, 61501, 69785, 60786, 63195, 65193, 63390,
  58166, 69065, 66364,
];

const week = (breaks: readonly number[], picks: readonly number[]) =>
  breaks.map((count, at) => ({ count, exposure: picks[at], cloth: 'sheeting', beam: '17' }));

describe('R glm, quasipoisson: two weeks of one loom', () => {
  const page = given(
    compareTwoWeeks([
      { loom: '12', before: week(BEFORE_BREAKS, BEFORE_PICKS), after: week(AFTER_BREAKS, AFTER_PICKS) },
    ]),
  );
  const [loom] = page.looms;

  it('adds up 49 breaks in 1,159,081 picks and 59 in 1,136,166', () => {
    expect(loom.before).toEqual({ count: 49, exposure: 1_159_081 });
    expect(loom.after).toEqual({ count: 59, exposure: 1_136_166 });
  });

  // R stops its iteration at a relative change of 1e-8 in the deviance, one step short of the last digits: its
  // dispersion is 6e-7 above the limit of its own iteration. Followed to the same stop, the iteration gives R's
  // figures; run on, it gives ours.
  it('follows R to the digits that R prints', () => {
    const { dispersion, f } = iterateAsR(1e-8);
    expectClose(dispersion, 1.592336146, 1e-9);
    expectClose(f, 0.7144841731, 1e-9);
    expectClose(fUpperTail(f, 1, 34), 0.4038684982, 1e-9);
  });

  it('finds dispersion, ratio, F and p', () => {
    const compared = given(loom.comparison);
    const limit = iterateAsR(1e-15);
    expectClose(page.dispersion.dispersion, limit.dispersion, 1e-10);
    expect(page.dispersion.degrees).toBe(34);
    expectClose(compared.ratio, 1.228366403, 1e-9);
    expectClose(compared.deviance.f, limit.f, 1e-10);
    expectClose(page.dispersion.dispersion, 1.592336146, 1e-6);
    expectClose(compared.deviance.f, 0.7144841731, 1e-6);
    expectClose(compared.deviance.p, 0.4038684982, 1e-6);
    // The score form, which decides, agrees to three digits so near the middle.
    expectClose(compared.p, 0.4038684982, 2e-3);
    expect(compared.low).toBeLessThan(1);
    expect(given(compared.high)).toBeGreaterThan(1);
  });

  it('and the plain exact test would say p .2916', () => {
    const plain = given(compareTwoRates(loom.after, loom.before));
    expectClose(plain.p, 0.2916412614, 1e-9);
    expectClose(plain.low, 0.8267367828, 1e-9);
    expectClose(plain.high, 1.832299908, 1e-9);
  });
});

/** R's glm.fit for counts by week with a log link: weighted means of the working response, until it stops. */
function iterateAsR(epsilon: number): { dispersion: number; f: number } {
  const shifts = [
    ...BEFORE_BREAKS.map((y, at) => ({ y, picks: BEFORE_PICKS[at], week: 0 })),
    ...AFTER_BREAKS.map((y, at) => ({ y, picks: AFTER_PICKS[at], week: 1 })),
  ];
  const iterate = (weekOf: (shift: { week: number }) => number) => {
    let means = shifts.map(({ y }) => y + 0.1);
    let deviance = devianceOf(means);
    for (;;) {
      const weights = means;
      const logRates = [0, 1].map((week) => {
        const own = shifts.flatMap((shift, at) => (weekOf(shift) === week ? [at] : []));
        const response = (at: number) =>
          Math.log(weights[at] / shifts[at].picks) + (shifts[at].y - weights[at]) / weights[at];
        const sum = own.reduce((all, at) => all + weights[at] * response(at), 0);
        return sum / own.reduce((all, at) => all + weights[at], 0);
      });
      means = shifts.map((shift) => shift.picks * Math.exp(logRates[weekOf(shift)]));
      const next = devianceOf(means);
      const stop = Math.abs(next - deviance) / (Math.abs(next) + 0.1) < epsilon;
      deviance = next;
      if (!stop) continue;
      const pearson = shifts.reduce(
        (all, { y }, at) => all + weights[at] * ((y - means[at]) / means[at]) ** 2,
        0,
      );
      return { deviance, pearson };
    }
  };
  const devianceOf = (means: readonly number[]) =>
    2 *
    shifts.reduce((all, { y }, at) => all + (y > 0 ? y * Math.log(y / means[at]) : 0) - (y - means[at]), 0);
  const byWeek = iterate(({ week }) => week);
  const alike = iterate(() => 0);
  const dispersion = byWeek.pearson / 34;
  return { dispersion, f: (alike.deviance - byWeek.deviance) / dispersion };
}
