import type { CauseGroup, CauseVersion } from '@shared/contract/reference';
import { markOf, type MarkKind } from '../../ui/mark-kind';

/** The causes that have a button of their own on every card. */
export const BUTTON_CAUSES = [
  { cause: 'warp-break', icon: 'warp', short: 'Warp', long: 'Warp break' },
  { cause: 'weft-break', icon: 'weft', short: 'Weft', long: 'Weft break' },
  { cause: 'pern-change', icon: 'pern', short: 'Pern', long: 'Pern change' },
] as const;

/** "Still standing" since so many minutes. */
export const SINCE_CHOICES = [
  { minutes: 0, words: 'now' },
  { minutes: 5, words: '5 min ago' },
  { minutes: 15, words: '15 min ago' },
] as const;

const GROUP_WORDS: Readonly<Record<CauseGroup, string>> = {
  warp: 'Warp',
  weft: 'Weft',
  loom: 'Loom, for the tackler',
  waiting: 'Waiting',
  'warp-change': 'Warp change',
  care: 'Cut, clean, check',
  shed: 'Shed stop',
  planned: 'Planned',
};
const GROUP_ORDER: readonly CauseGroup[] = [
  'warp',
  'weft',
  'care',
  'waiting',
  'warp-change',
  'loom',
  'shed',
  'planned',
];
/** Only an automatic loom can have these. */
const BATTERY_CAUSES = new Set(['transfer-failed', 'battery-empty']);

export interface CauseChoice {
  readonly cause: string;
  readonly name: string;
  readonly mark: MarkKind;
  readonly group: CauseGroup;
}
export interface CauseSection {
  /** `often`: what this loom stands for most. */
  readonly group: CauseGroup | 'often';
  readonly words: string;
  readonly causes: readonly CauseChoice[];
}

/** So many of a loom's commonest causes stand first. */
const OFTEN = 4;

/**
 * Causes in force: first those that this loom has most (they stand in their groups too, where a hand knows them), then
 * all by group; without what this loom cannot have and without `leaveOut`.
 *
 * @param options.often the loom's causes, the commonest first
 */
export function causeSections(
  causes: readonly CauseVersion[],
  options: {
    readonly battery: boolean;
    readonly leaveOut: readonly string[];
    readonly often: readonly string[];
  },
): readonly CauseSection[] {
  const offered = causes.filter(
    (cause) =>
      !options.leaveOut.includes(cause.causeId) && (options.battery || !BATTERY_CAUSES.has(cause.causeId)),
  );
  const sections: CauseSection[] = GROUP_ORDER.map((group) => ({
    group,
    words: GROUP_WORDS[group],
    causes: offered.filter((cause) => cause.group === group).map(choiceOf),
  }));
  const often: CauseSection = {
    group: 'often',
    words: 'Most on this loom',
    causes: options.often
      .filter((cause) => !HAS_BUTTON.has(cause))
      .flatMap((cause) => offered.find((one) => one.causeId === cause) ?? [])
      .slice(0, OFTEN)
      .map(choiceOf),
  };
  return [often, ...sections].filter((section) => section.causes.length > 0);
}

const HAS_BUTTON: ReadonlySet<string> = new Set(BUTTON_CAUSES.map(({ cause }) => cause));

function choiceOf({ causeId, name, group }: CauseVersion): CauseChoice {
  return { cause: causeId, name, mark: markOf(causeId, group), group };
}
