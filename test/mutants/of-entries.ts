import type { Mutant } from './mutant.js';

export const ENTRIES: readonly Mutant[] = [
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
    file: 'entries/stands.ts',
    original: 'named.find((one) => one.at >= stop.at) ?? named[0]',
    mutated: 'named[0]',
    why: 'a Running before the stop leaves it no time, whatever comes after',
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
    original: 'clock && !exchanged ?',
    mutated: 'clock ?',
    why: 'readings of two clocks are taken from one another',
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
