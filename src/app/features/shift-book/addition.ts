import { LIMITS } from '@shared/contract/limits';
import { inForceAt, type Reference } from '@shared/contract/reference';
import type { LoomRecord } from '@shared/contract/shift-records';
import { stoppedMeal } from '@shared/figures/loom-line';
import type { EntryDraft } from '../../offline/entry-draft';
import { checkReading, typedReading } from '../../ui/pick-reading';
import { momentAfter } from './times';

export type Added = 'start' | 'end' | 'stop' | 'picks' | 'weaver' | 'cloth';

/** What the form for a missing entry holds, as typed. */
export interface AdditionValues {
  readonly value: string;
  readonly cause: string;
  readonly count: string;
  readonly at: string;
  readonly until: string;
  readonly picks: string;
  readonly weaverId: string;
  readonly clothId: string;
  readonly reason: string;
  /** The person was asked about an unlikely reading and keeps it. */
  readonly kept: boolean;
}

export interface Addition {
  /** Moments by the mill's clock. Null: it cannot be saved so, `problem` says why. */
  readonly draft: EntryDraft | null;
  readonly problem: string;
  /** An unlikely reading is asked about; empty: nothing odd. */
  readonly question: string;
}

interface Around {
  readonly record: LoomRecord;
  readonly reference: Reference;
  /** Now by the mill's clock. */
  readonly now: number;
}

/** A missing entry, typed from a card or from what somebody says. */
export function additionOf(what: Added, values: AdditionValues, around: Around): Addition {
  switch (what) {
    case 'start':
    case 'end':
      return reading(what, values, around);
    case 'stop':
      return stop(values, around);
    case 'picks':
      return picks(values, around);
    case 'weaver': {
      if (!values.weaverId) return wrong('Choose who minded the loom.');
      const { shift, loomId } = around.record;
      return right({
        kind: 'assign',
        ...place(around),
        at: shift.startsAt,
        weaverId: values.weaverId,
        loomIds: [loomId],
      });
    }
    case 'cloth': {
      if (!values.clothId) return wrong('Choose the cloth.');
      const { shift, loomId } = around.record;
      const { shedId } = shift;
      return right({
        kind: 'warp-change',
        how: 'as-found',
        warpId: null,
        clothId: values.clothId,
        loomId,
        shedId,
        at: shift.startsAt,
        source: 'paper',
      });
    }
  }
}

function reading(boundary: 'start' | 'end', values: AdditionValues, around: Around): Addition {
  const { shift, loomId, line } = around.record;
  const at = boundary === 'start' ? shift.startsAt : Math.min(shift.endsAt, around.now);
  const versions = around.reference.loomVersions.filter((one) => one.loomId === loomId);
  const version = inForceAt(versions, at) ?? versions[0];
  if (!version) return wrong('This device does not know the loom’s pick clock yet.');
  const typed = typedReading(values.value, version.clock, '');
  if (typed.complaint) return wrong(typed.complaint);
  if (typed.digits === '') return wrong('Type what the pick clock showed.');
  const value = Number(typed.digits);
  const other = line.readings.find(
    (one) => one.id === (boundary === 'start' ? line.endReadingId : line.startReadingId),
  );
  const meal = stoppedMeal(shift);
  const minutes = (shift.endsAt - shift.startsAt - (meal ? meal.until - meal.from : 0)) / 60_000;
  const about = { id: loomId, clock: version.clock, ppm: version.ppm, minutes };
  const question = other
    ? boundary === 'start'
      ? checkReading({ ...about, previous: value }, other.value).question
      : checkReading({ ...about, previous: other.newValue ?? other.value }, value).question
    : '';
  if (question && !values.kept) return { draft: null, problem: question, question };
  return {
    draft: {
      kind: 'reading',
      ...place(around),
      loomId,
      boundary,
      value,
      at,
      source: 'paper',
      ...(question && { kept: true }),
    },
    problem: '',
    question,
  };
}

function stop(values: AdditionValues, around: Around): Addition {
  const { shift, loomId } = around.record;
  const { timeZone } = around.reference.mill;
  if (!values.cause) return wrong('Choose the cause.');
  const at = momentAfter(values.at, shift.startsAt, timeZone);
  if (at === null) return wrong('Type when it stood as hours and minutes: 09:40.');
  if (at >= shift.endsAt) return wrong('That time lies outside the shift.');
  if (at > around.now) return wrong('That time has not come yet.');
  const until = values.until.trim() === '' ? null : momentAfter(values.until, at, timeZone);
  if (values.until.trim() !== '' && (until === null || until - at > shift.endsAt - shift.startsAt))
    return wrong('Type when it ran again as hours and minutes, after it stood.');
  const count = Number(values.count);
  if (!Number.isInteger(count) || count < 1 || count > LIMITS.count)
    return wrong('The count is a whole number.');
  const { shedId } = shift;
  return right({
    kind: 'stop',
    shedId,
    loomId,
    cause: values.cause,
    count,
    at,
    source: 'paper',
    ...(until !== null && { until }),
  });
}

function picks(values: AdditionValues, around: Around): Addition {
  const bare = values.picks.replace(/[\s,]/g, '');
  if (!/^\d{1,9}$/.test(bare)) return wrong('Type the picks that were agreed, in digits.');
  const reason = values.reason.trim();
  if (!reason) return wrong('Say why in a word or two: agreed picks are paid and marked.');
  const { loomId } = around.record;
  return right({ kind: 'decide', ...place(around), loomId, about: { agreedPicks: Number(bare) }, reason });
}

const place = ({ record: { shift } }: Around) => ({ shedId: shift.shedId, shiftKey: shift.key });
const right = (draft: EntryDraft): Addition => ({ draft, problem: '', question: '' });
const wrong = (problem: string): Addition => ({ draft: null, problem, question: '' });
