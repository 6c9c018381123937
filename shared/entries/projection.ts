import { inForceAt } from '../contract/reference.js';
import { lineTotals, stoppedMeal, windowOf } from '../figures/loom-line.js';
import { mostBelievable } from '../figures/pick-clock.js';
import { standingTime, without, type Span } from '../figures/standing-time.js';
import { isKind, resolveCorrections, type ResolvedEntry } from './corrections.js';
import { loomsNamedBy } from './entry.js';
import { fittingsOf } from './fittings.js';
import { lineCounts } from './line-counts.js';
import { loggingFlags, sortedFlags, stopFlags } from './line-flags.js';
import { lineReadings } from './line-readings.js';
import { causeLookup, lineStops } from './line-stops.js';
import type { LineStop, LoomLine } from './loom-line.js';
import type { LineInput } from './projection-input.js';
import { timedStopsOf } from './stands.js';
import { cutStretches, sharePicks } from './stretches.js';
import { weaverChanges } from './weavers.js';

type Flag = LoomLine['flags'][number];

/** Share of T above which unaccounted time is flagged. */
const MUCH_UNACCOUNTED = 0.1;

/**
 * Projects one loom's entries in one shift to its line. Pure: the same input gives the same bytes, in whatever
 * order entries, versions and fittings come; nothing depends on "now". It never throws for what a person may have
 * logged: what is missing or contradicts itself is flagged.
 */
export function projectLine(input: LineInput): LoomLine {
  const { shift, loomId } = input;
  const all = resolveCorrections(input.entries).filter((one) => isOfLoom(one, input));
  const resolved = all.filter((one) => !one.voided);
  const loomVersions = input.loomVersions.filter((one) => one.loomId === loomId);
  const clockAt = (at: number) => inForceAt(loomVersions, at)?.clock ?? null;
  const readings = lineReadings({
    shift,
    previous: input.previous,
    next: input.next,
    resolved,
    clockAt,
  });
  const { window, sheet } = readings;
  const timed = timedStopsOf(resolved, input.looms).filter((one) => one.loomId === loomId);
  const bare = cutStretches({
    window,
    loomVersions,
    clothVersions: input.clothVersions,
    fittings: fittingsOfLoom(all, input),
    weavers: weaverChanges(resolved, shift, window, loomId, sheet?.entry.weaverId ?? null),
    stood: timed.map((one) => ({ from: one.from, until: one.until ?? window.until })),
    changeReadings: readings.readings.filter((one) => one.boundary === 'change'),
  });
  const stretchStart = (at: number) =>
    bare.stretches.filter((one) => one.from <= at).at(-1)?.from ?? window.from;
  const causes = causeLookup(input.causeVersions, stretchStart);
  const batteryAt = (at: number) => inForceAt(loomVersions, stretchStart(at))?.battery ?? false;
  const stops = lineStops({ shift, resolved, timed, loomId, causeAt: causes.causeAt, batteryAt });
  const counts = lineCounts(
    resolved,
    sheet,
    shift,
    (cause) => causes.causeAt(cause, window.from),
    batteryAt(window.from),
  );
  const meal = stoppedMeal(shift);
  const picked = sharePicks({
    bare,
    from: readings,
    shiftStartsAt: shift.startsAt,
    meal,
    standing: standingTime(stops, window),
    estimatedMs: (span) => estimatedWithin(stops, span),
  });
  const line: LoomLine = {
    shift,
    shedId: shift.shedId,
    loomId,
    stretches: picked.stretches,
    stops,
    readings: [...readings.readings],
    startReadingId: readings.start?.id ?? null,
    endReadingId: readings.end?.id ?? null,
    picks: readings.picks,
    picksBy: readings.picksBy,
    readingMinutes: readings.offBoundary ? spanMinutes(window, meal) : null,
    ...counts,
    flags: [],
    versionIds: versionIds(picked.stretches, causes.used),
  };
  const off = readings.flags.map((flag) =>
    flag.code === 'reading-off-boundary' && line.readingMinutes !== null
      ? { ...flag, value: line.readingMinutes }
      : flag,
  );
  const flags = sortedFlags([
    ...off,
    ...inconsistentReadings(picked.inconsistent),
    ...stretchFlags(line),
    ...stopFlags(stops, timed),
    ...loggingFlags(all, shift, loomId, stops),
    ...picksFlags(line, clockAt(shift.startsAt)?.unit ?? 1),
  ]);
  return { ...line, flags };
}

/** Whether an entry can touch the loom. What names a stop, a call or an entry follows what it names. */
function isOfLoom({ entry }: ResolvedEntry, { loomId, looms }: LineInput): boolean {
  if (entry.kind === 'resume' || entry.kind === 'call' || entry.kind === 'attend' || entry.kind === 'repair')
    return true;
  return loomsNamedBy(entry, looms).includes(loomId);
}

/** Fittings as given, with those that the entries themselves say in place of an older state of them. */
function fittingsOfLoom(all: readonly ResolvedEntry[], input: LineInput) {
  const said = new Set(all.filter((one) => isKind(one, 'warp-change')).map((one) => one.root.entry.id));
  const given = input.fittings.filter((one) => !said.has(one.id));
  return [...given, ...fittingsOf(all)].filter((one) => one.loomId === input.loomId);
}

function estimatedWithin(stops: readonly LineStop[], span: Span): number {
  return stops
    .filter((one) => one.from >= span.from && one.from < span.until)
    .reduce((sum, one) => sum + one.estimatedMs, 0);
}

function spanMinutes(window: Span, meal: Span | null): number {
  return without([window], meal).reduce((sum, one) => sum + (one.until - one.from), 0) / 60_000;
}

function versionIds(stretches: LoomLine['stretches'], causes: ReadonlySet<string>): string[] {
  const used = stretches.flatMap((one) => [one.loomVersionId, one.clothVersionId]);
  return [...new Set([...used.filter((id) => id !== null), ...causes])].sort();
}

function inconsistentReadings(picks: number): Flag[] {
  return picks > 0 ? [{ code: 'readings-disagree', value: picks }] : [];
}

function stretchFlags({ stretches, picksBy }: LoomLine): Flag[] {
  const flags: Flag[] = [];
  if (stretches.some((one) => one.picksBy === 'shared')) flags.push({ code: 'estimated-split' });
  if (picksBy === 'agreed') flags.push({ code: 'agreed-picks' });
  if (stretches.some((one) => one.weaverId === null)) flags.push({ code: 'no-weaver' });
  if (stretches.some((one) => one.clothId === null)) flags.push({ code: 'no-cloth' });
  if (stretches.some((one) => one.ppm === null)) flags.push({ code: 'no-speed' });
  return flags;
}

/** What the sums say of a line whose picks are known. */
function picksFlags(line: LoomLine, unit: number): Flag[] {
  if (line.picks === null) return [];
  const totals = lineTotals(line, Math.max(windowOf(line).until, line.shift.endsAt));
  const { possiblePicks, measuredPicks, estimatedPicks, weavingMinutes } = totals;
  if (possiblePicks === null || measuredPicks === null || estimatedPicks === null) return [];
  const flags: Flag[] = [];
  if (line.picks > mostBelievable(possiblePicks, unit))
    flags.push({ code: 'more-than-possible', value: line.picks });
  const unaccounted = possiblePicks - line.picks - measuredPicks - estimatedPicks;
  if (unaccounted < -unit) flags.push({ code: 'over-logged', value: -unaccounted });
  const minutes = totals.minutes - totals.stopMinutes - (weavingMinutes ?? 0);
  if (weavingMinutes !== null && minutes > totals.minutes * MUCH_UNACCOUNTED)
    flags.push({ code: 'much-unaccounted', value: minutes });
  return flags;
}
