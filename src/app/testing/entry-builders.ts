import type { PulledEntry, PullResponse } from '@shared/contract/sync';
import type { Entry } from '@shared/entries/entry';
import { newId } from '../core/ids';
import { stampDraft, type EntryDraft, type Stamp, type Unnumbered } from '../offline/entry-draft';

/** 2026-11-30T08:00Z, a Monday morning in the shed. */
export const MORNING = Date.UTC(2026, 10, 30, 8);

export function aStamp(over: Partial<Stamp> = {}): Stamp {
  return {
    shedId: 'shed-1',
    by: 'ada',
    grantId: 'grant-1',
    deviceId: 'tablet-1',
    now: MORNING,
    clock: undefined,
    newId,
    steppedSince: () => false,
    ...over,
  };
}

/** An entry ready for the outbox: a warp break on loom 1 unless said. */
export function anUnnumbered(draft: Partial<EntryDraft> = {}, stamp: Partial<Stamp> = {}): Unnumbered {
  const whole = { kind: 'stop', loomId: 'loom-1', cause: 'warp-break', count: 1, ...draft };
  return stampDraft(whole as EntryDraft, aStamp(stamp));
}

export function pulled(entry: Entry, over: Partial<PulledEntry> = {}): PulledEntry {
  return { entry, at: entry.at, until: null, changedAt: null, shiftKey: null, holds: [], ...over };
}

export function aPull(over: Partial<PullResponse> = {}): PullResponse {
  return {
    serverNow: MORNING,
    snapshot: false,
    resend: false,
    cursor: 'epoch.scope.1.x',
    more: false,
    entries: [],
    shifts: [],
    fittings: [],
    reference: null,
    people: null,
    ...over,
  };
}
