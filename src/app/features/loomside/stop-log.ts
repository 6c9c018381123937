import { DestroyRef, Injectable, inject, signal } from '@angular/core';
import { LIMITS } from '@shared/contract/limits';
import type { Loom } from '@shared/contract/reference';
import { Clock } from '../../core/clock';
import type { EntryDraft } from '../../offline/entry-draft';
import { NOT_SAVED, NotSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';
import { clockTime } from '../../ui/clock-time';
import type { CardAct } from './loom-card';
import type { CallView, LoomView } from './loom-view';
import { LoomsideStore } from './loomside-store';
import type { ShedScope } from './stop-sheet';

/** The last act, while it may be taken back in one tap. */
export interface LastAct {
  readonly loomId: string | null;
  /** "Warp break on loom 16, counted 10:09". */
  readonly words: string;
  /** Takes it back; null: there is nothing of one's own to take back. */
  readonly undo: (() => Promise<unknown>) | null;
  /** A call for the tackler: how it stands is said with it, and changes while it is shown. */
  readonly callId?: string;
  /** A counted stop that may turn out to be a loom still standing. */
  readonly counted: { readonly id: string; readonly cause: string; readonly at: number } | null;
}

/**
 * A card says that it is saving only where the disk takes longer than this, ms: a hand sees no shorter wait, and each
 * drawing of the screen on a slow tablet holds up the saving itself.
 */
const SAVING_SHOWN_AFTER = 100;

/** How long a card shows that its tap is saved. */
const SAVED_SHOWN = 2_500;

const SHEET_MISSING =
  'Nothing was logged: the list of other stops is not on this device yet. Try again when there is a network; what was logged before is safe.';

/**
 * Logs what happens at the looms. Nothing is shown as saved before the book on this device says that it is; what
 * could not be saved stays on its card with a sentence until the next act there.
 */
@Injectable({ providedIn: 'root' })
export class StopLog {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly store = inject(LoomsideStore);

  private readonly last = signal<LastAct | null>(null);
  private readonly acts = signal<ReadonlyMap<string, CardAct>>(new Map());
  private lastTimer: ReturnType<typeof setTimeout> | undefined;
  private readonly cardTimers = new Map<string, ReturnType<typeof setTimeout>>();
  /** Looms whose call is being saved. */
  private readonly calling = new Set<string>();

  readonly lastAct = this.last.asReadonly();
  readonly cardActs = this.acts.asReadonly();

  constructor() {
    inject(DestroyRef).onDestroy(() => {
      clearTimeout(this.lastTimer);
      for (const timer of this.cardTimers.values()) clearTimeout(timer);
    });
  }

  /** The sheet with the other causes was never fetched, and there is no network. */
  sheetMissing(loom: Loom): void {
    this.show({ loomId: loom.id, cause: '', state: 'failed', sentence: SHEET_MISSING });
  }

  /** A tap: it stood and runs again. */
  count(loom: Loom, cause: string): Promise<void> {
    return this.keep(loom, cause, async () => {
      const entry = await this.book.log({ kind: 'stop', loomId: loom.id, cause, count: 1 });
      return {
        loomId: loom.id,
        words: `${this.store.causeName(cause)} on loom ${loom.number}, counted ${this.time(entry.at)}`,
        undo: () => this.book.undo(entry.id),
        counted: { id: entry.id, cause, at: entry.at },
      };
    });
  }

  /** It stands, since so many minutes. */
  stand(loom: Loom, cause: string, minutesAgo: number): Promise<void> {
    return this.keep(loom, cause, async () => {
      const at = this.clock.now() - minutesAgo * 60_000;
      const entry = await this.book.log({ kind: 'standing', loomId: loom.id, cause, at });
      return this.stood(loom, cause, at, () => this.book.undo(entry.id));
    });
  }

  /** What was counted a moment ago does not run after all. */
  stillStanding(loom: Loom): Promise<void> {
    const counted = this.last()?.counted;
    if (!counted || this.last()?.loomId !== loom.id) return Promise.resolve();
    const { id, cause, at } = counted;
    return this.keep(loom, cause, async () => {
      const basedOn = this.book.basedOn(id);
      const entries = await this.book.logAll([
        { kind: 'void', targetId: id, reason: 'It still stands', ...(basedOn !== undefined && { basedOn }) },
        { kind: 'standing', loomId: loom.id, cause, at },
      ]);
      const batchId = entries[0]?.batchId;
      return this.stood(loom, cause, at, () =>
        batchId === undefined ? Promise.resolve() : this.book.undoBatch(batchId),
      );
    });
  }

  /** It runs: every stop that is open on this loom ends. */
  run(view: LoomView): Promise<void> {
    const { loom, standing } = view;
    if (!standing) return Promise.resolve();
    return this.keep(loom, 'running', async () => {
      const drafts = standing.openIds.map((targetId): EntryDraft => ({
        kind: 'resume',
        loomId: loom.id,
        targetId,
      }));
      const { undo, at } = await this.write(drafts);
      return {
        loomId: loom.id,
        words: `Loom ${loom.number} runs since ${this.time(at)}`,
        undo,
        counted: null,
      };
    });
  }

  /** Another cause for what stands. */
  changeCause(view: LoomView, cause: string): Promise<void> {
    const { loom, standing } = view;
    if (!standing || standing.shedWide) return Promise.resolve();
    return this.keep(loom, 'other', async () => {
      const basedOn = this.book.basedOn(standing.stopId);
      const entry = await this.book.log({
        kind: 'amend',
        targetId: standing.stopId,
        reason: 'Cause changed while it stood',
        change: { cause },
        ...(basedOn !== undefined && { basedOn }),
      });
      return {
        loomId: loom.id,
        words: `Loom ${loom.number} stands for: ${this.store.causeName(cause)}`,
        undo: () => this.book.undo(entry.id),
        counted: null,
      };
    });
  }

  /** One call at a time: where one is open, that is said and no other logged. */
  call(view: LoomView): Promise<void> {
    const { loom, standing } = view;
    if (this.calling.has(loom.id)) return Promise.resolve();
    const open = this.store.openCall(loom);
    if (open) {
      this.showLast(this.calledAlready(loom, open));
      return Promise.resolve();
    }
    this.calling.add(loom.id);
    return this.keep(loom, 'call', async () => {
      const entry = await this.book.log({
        kind: 'call',
        loomId: loom.id,
        ...(standing && { targetId: standing.stopId }),
      });
      return {
        loomId: loom.id,
        words: `Loom ${loom.number}: call saved ${this.time(entry.at)}`,
        callId: entry.id,
        undo: () => this.book.undo(entry.id),
        counted: null,
      };
    }).finally(() => this.calling.delete(loom.id));
  }

  /** Power, air, alarm: stops all that the scope names with one entry. */
  shedStop(loom: Loom, cause: string, minutesAgo: number, of: ShedScope): Promise<void> {
    return this.keep(loom, 'other', async () => {
      const at = this.clock.now() - minutesAgo * 60_000;
      const scope =
        of === 'shed'
          ? ({ of } as const)
          : of === 'row'
            ? ({ of, row: loom.row } as const)
            : ({ of, loomIds: this.store.set().map((view) => view.loom.id) } as const);
      const entry = await this.book.log({ kind: 'shed-stop', cause, at, scope });
      const what = of === 'shed' ? 'the whole shed' : of === 'row' ? `row ${loom.row}` : 'all my looms';
      return {
        loomId: null,
        words: `${this.store.causeName(cause)}: ${what} standing since ${this.time(at)}`,
        undo: () => this.book.undo(entry.id),
        counted: null,
      };
    });
  }

  /** Takes the last act back. */
  async undoLast(): Promise<void> {
    const act = this.last();
    if (!act?.undo) return;
    this.showLast(null);
    try {
      await act.undo();
    } catch (error) {
      const { loomId, undo } = act;
      this.showLast({ loomId, undo, words: sentenceOf(error), counted: null });
    }
  }

  private async keep(loom: Loom, cause: string, save: () => Promise<LastAct>): Promise<void> {
    // Felt at once: a finger waits for no disk. That it is saved is shown when it is.
    navigator.vibrate?.(40);
    const timer = this.savingSoon({ loomId: loom.id, cause, state: 'saving', sentence: '' });
    try {
      const act = await save().finally(() => clearTimeout(timer));
      this.show({ loomId: loom.id, cause, state: 'saved', sentence: '' });
      this.showLast(act);
    } catch (error) {
      this.show({ loomId: loom.id, cause, state: 'failed', sentence: sentenceOf(error) });
      navigator.vibrate?.([80, 60, 80]);
    }
  }

  private async write(drafts: readonly EntryDraft[]): Promise<{ undo: () => Promise<unknown>; at: number }> {
    const [only, ...more] = drafts;
    if (only && more.length === 0) {
      const entry = await this.book.log(only);
      return { undo: () => this.book.undo(entry.id), at: entry.at };
    }
    const [first] = await this.book.logAll(drafts);
    const batchId = first?.batchId;
    return {
      undo: () => (batchId === undefined ? Promise.resolve() : this.book.undoBatch(batchId)),
      at: first?.at ?? this.clock.now(),
    };
  }

  private calledAlready(loom: Loom, open: CallView): LastAct {
    const mine = this.book.recentOf(loom.id).some((own) => own.id === open.id);
    return {
      loomId: loom.id,
      words: `Loom ${loom.number}: a call is open since ${clockTime(open.since, this.store.timeZone())}`,
      callId: open.id,
      undo: mine ? () => this.book.undo(open.id) : null,
      counted: null,
    };
  }

  private stood(loom: Loom, cause: string, at: number, undo: LastAct['undo']): LastAct {
    return {
      loomId: loom.id,
      words: `Loom ${loom.number}: ${this.store.causeName(cause)}, standing since ${this.time(at)}`,
      undo,
      counted: null,
    };
  }

  /** By the mill's wall clock: `at` is the device's. */
  private time(at: number): string {
    return clockTime(at + this.clock.offset(), this.store.timeZone());
  }

  /** At once where the card says that something failed: that is not so any more. */
  private savingSoon(act: CardAct): ReturnType<typeof setTimeout> | undefined {
    if (this.acts().get(act.loomId)?.state !== 'failed')
      return setTimeout(() => this.show(act), SAVING_SHOWN_AFTER);
    this.show(act);
    return undefined;
  }

  private show(act: CardAct): void {
    this.acts.update((acts) => new Map(acts).set(act.loomId, act));
    clearTimeout(this.cardTimers.get(act.loomId));
    if (act.state === 'saved')
      this.cardTimers.set(
        act.loomId,
        setTimeout(() => this.forget(act), SAVED_SHOWN),
      );
  }

  private forget(act: CardAct): void {
    this.acts.update((acts) => {
      const next = new Map(acts);
      if (next.get(act.loomId) === act) next.delete(act.loomId);
      return next;
    });
  }

  private showLast(act: LastAct | null): void {
    clearTimeout(this.lastTimer);
    this.last.set(act);
    if (act) this.lastTimer = setTimeout(() => this.last.set(null), LIMITS.undoWindow);
  }
}

function sentenceOf(error: unknown): string {
  return error instanceof NotSaved ? error.sentence : NOT_SAVED['storage-closed'];
}
