import type { LoomLine } from '../entries/loom-line.js';
import { flagNeedsLook } from '../entries/needs-look.js';
import { formatCount, formatMinutes } from '../figures/format.js';

type Flag = LoomLine['flags'][number];

/** While a shift runs its end is not there yet: nobody is asked to look for it. */
export function flagsToShow(flags: readonly Flag[], runs: boolean): readonly Flag[] {
  return runs ? flags.filter(({ code }) => code !== 'no-end-reading' && code !== 'stop-still-open') : flags;
}

export interface SaidFlag {
  readonly words: string;
  readonly look: boolean;
}

/** A line's flags in words, those that need a look first. What would be said twice (of both ends) is said once. */
export function flagsInWords(flags: readonly Flag[], runs: boolean): readonly SaidFlag[] {
  const said = new Map<string, SaidFlag>();
  for (const flag of flagsToShow(flags, runs)) {
    const words = flagWords(flag);
    said.set(words, { words, look: flagNeedsLook(flag.code) || (said.get(words)?.look ?? false) });
  }
  return [...said.values()].sort((a, b) => Number(b.look) - Number(a.look));
}

/** A flag in words, short enough to stand beside its line. */
export function flagWords({ code, value }: Flag): string {
  const by = (words: string, unit = '') =>
    value === undefined ? '' : `${words}${formatCount(value)}${unit}`;
  switch (code) {
    case 'no-start-reading':
      return 'no start reading';
    case 'no-end-reading':
      return 'no end reading';
    case 'readings-disagree':
      return `readings disagree${by(' by ', ' picks')}`;
    case 'reading-off-boundary':
      return `read off the shift’s ends${value === undefined ? '' : `: held against ${formatMinutes(value)}`}`;
    case 'clock-changed':
      return 'another clock, and no reset reading';
    case 'more-than-possible':
      return 'more picks than this loom can weave';
    case 'agreed-picks':
      return 'picks agreed, clock out of order';
    case 'woven-between-shifts':
      return `${by('', ' picks ')}woven between shifts`.trim();
    case 'stop-still-open':
      return 'a stop was never ended';
    case 'stop-inside-stop':
      return 'a stop inside a stop';
    case 'time-uncertain':
      return 'a time is uncertain';
    case 'corrected-twice':
      return 'corrected twice';
    case 'clock-offset':
      return `tablet’s clock off${value === undefined ? '' : ` by ${formatMinutes(Math.abs(value) / 60_000)}`}`;
    case 'over-logged':
      return `over-logged${by(' by ', ' picks')}`;
    case 'much-unaccounted':
      return `${value === undefined ? 'much' : formatMinutes(Math.round(value))} unaccounted for`;
    case 'estimated-split':
      return 'picks shared by running time';
    case 'no-weaver':
      return 'no weaver';
    case 'no-cloth':
      return 'no cloth';
    case 'no-speed':
      return 'speed not known';
  }
}
