import { ATTENDED_BY, CAUSE_GROUPS, type CauseGroup } from '@shared/contract/reference';
import type { CauseFacts } from '@shared/contract/set-up';
import { PLAIN, nameProblem, readWithin, textOf } from '../cloths/typed';

export const GROUP_WORDS: Readonly<Record<CauseGroup, string>> = {
  warp: 'Warp',
  weft: 'Weft',
  loom: 'Loom',
  waiting: 'Waiting',
  'warp-change': 'Warp change',
  care: 'Care',
  shed: 'Shed',
  planned: 'Planned',
};
export const GROUPS = CAUSE_GROUPS.map((group) => ({ group, label: GROUP_WORDS[group] }));

export const ATTENDED_WORDS: Readonly<Record<CauseFacts['attendedBy'], string>> = {
  weaver: 'weaver',
  tackler: 'tackler',
  knotter: 'knotter',
  nobody: 'nobody',
};
export const ATTENDERS = ATTENDED_BY.map((who) => ({ who, label: ATTENDED_WORDS[who] }));

/** A cause's form as typed. */
export interface CauseValues {
  readonly name: string;
  readonly group: CauseGroup;
  readonly attendedBy: CauseFacts['attendedBy'];
  /** Always timed: a tap without a time counts no minutes. */
  readonly timed: boolean;
  readonly allowance: string;
  readonly breakOf: CauseFacts['breakOf'];
}
export type CauseField = 'name' | 'attendedBy' | 'allowance' | 'breakOf';

export interface CauseReading {
  readonly facts: CauseFacts | null;
  readonly problems: Readonly<Partial<Record<CauseField, string>>>;
}

export function causeValuesOf(facts: CauseFacts | null): CauseValues {
  if (!facts)
    return { name: '', group: 'loom', attendedBy: 'tackler', timed: true, allowance: '', breakOf: null };
  const { allowanceS, ...rest } = facts;
  return {
    ...rest,
    timed: allowanceS === null,
    allowance: allowanceS === null ? '' : textOf(allowanceS, PLAIN),
  };
}

/** What the form says; waiting, shed and planned stops have nobody who mends them and always last a while. */
export function readCause(
  values: CauseValues,
  stored: CauseFacts | null = null,
  taken: readonly string[] = [],
): CauseReading {
  const problems: Partial<Record<CauseField, string>> = {};
  const named = nameProblem(values.name, 'the cause', taken);
  if (named) problems.name = named;
  if (['waiting', 'shed', 'planned'].includes(values.group) && values.attendedBy !== 'nobody')
    problems.attendedBy = `Nobody mends a stop of this group: choose “nobody”.`;
  if (values.breakOf !== null && values.breakOf !== values.group)
    problems.breakOf =
      values.breakOf === 'warp'
        ? 'Only a cause of the group Warp counts as a warp break.'
        : 'Only a cause of the group Weft counts as a weft break.';
  let allowanceS: number | null = null;
  if (!values.timed) {
    const read = readWithin(
      values.allowance,
      SECONDS,
      { what: 'the allowance', usual: 60, least: 0, most: 36_000 },
      stored?.allowanceS,
    );
    if (read.problem) problems.allowance = `${read.problem} Or choose “timed”.`;
    allowanceS = read.value;
  }
  if (Object.keys(problems).length > 0) return { facts: null, problems };
  const { group, attendedBy, breakOf } = values;
  return { facts: { name: values.name.trim(), group, attendedBy, allowanceS, breakOf }, problems };
}

const SECONDS = { ...PLAIN, unit: 's' };

/** "60 s", or "timed". */
export function allowanceWords(allowanceS: number | null): string {
  return allowanceS === null ? 'timed' : `${textOf(allowanceS, PLAIN)} s`;
}

/** What a tap on this cause will count for, as a sentence. */
export function tapSentence(facts: CauseFacts): string {
  const counts = facts.breakOf === null ? '' : `, and one ${facts.breakOf} break`;
  return facts.allowanceS === null
    ? `A tap counts one stop${counts}; its minutes are those that are timed, or none.`
    : `A tap counts one stop${counts}, and ${textOf(facts.allowanceS, PLAIN)} s marked as estimated unless it is timed.`;
}
