import { DestroyRef, Injectable, inject, signal } from '@angular/core';
import { LIMITS } from '@shared/contract/limits';
import { Clock } from '../../core/clock';
import { NOT_SAVED, NotSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';
import { clockTime } from '../../ui/clock-time';
import { CallsStore, type CallRow } from './calls-store';

export type CallStep = 'take' | 'arrive' | 'done' | 'leave';

/** The last act, while it may be taken back in one tap. */
export interface CallAct {
  readonly words: string;
  /** Null: nothing was saved, so there is nothing to take back. */
  readonly undo: (() => Promise<unknown>) | null;
}

const SAID: Readonly<Record<CallStep, string>> = {
  take: 'taken',
  arrive: 'there since',
  done: 'done',
  leave: 'left undone, it waits again',
};

/** Logs what the tackler says of calls. Nothing is shown as saved before the book on this device says that it is. */
@Injectable({ providedIn: 'root' })
export class CallLog {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly store = inject(CallsStore);
  private readonly last = signal<CallAct | null>(null);
  /** Calls whose step is being saved: a second tap meanwhile is none. */
  private readonly saving = new Set<string>();
  private timer: ReturnType<typeof setTimeout> | undefined;

  readonly lastAct = this.last.asReadonly();

  constructor() {
    inject(DestroyRef).onDestroy(() => clearTimeout(this.timer));
  }

  /** Says whether it was saved. */
  async say(row: Pick<CallRow, 'id' | 'loom'>, step: CallStep): Promise<boolean> {
    if (this.saving.has(row.id)) return false;
    this.saving.add(row.id);
    try {
      const entry = await this.book.log({ kind: 'attend', loomId: row.loom.id, targetId: row.id, step });
      const at = clockTime(entry.at + this.clock.offset(), this.store.timeZone());
      this.show({
        words: `Loom ${row.loom.number}: ${SAID[step]}${step === 'leave' ? '' : ` ${at}`}`,
        undo: () => this.book.undo(entry.id),
      });
      navigator.vibrate?.(40);
      return true;
    } catch (error) {
      this.show({ words: sentenceOf(error), undo: null });
      navigator.vibrate?.([80, 60, 80]);
      return false;
    } finally {
      this.saving.delete(row.id);
    }
  }

  /** What another screen of the tackler's saved. */
  said(words: string, undo: CallAct['undo']): void {
    this.show({ words, undo });
    navigator.vibrate?.(40);
  }

  async undoLast(): Promise<void> {
    const act = this.last();
    if (!act?.undo) return;
    this.show(null);
    try {
      await act.undo();
    } catch (error) {
      this.show({ words: sentenceOf(error), undo: act.undo });
    }
  }

  private show(act: CallAct | null): void {
    clearTimeout(this.timer);
    this.last.set(act);
    if (act) this.timer = setTimeout(() => this.last.set(null), LIMITS.undoWindow);
  }
}

export function sentenceOf(error: unknown): string {
  return error instanceof NotSaved ? error.sentence : NOT_SAVED['storage-closed'];
}
