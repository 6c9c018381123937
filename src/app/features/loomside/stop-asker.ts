import { Injectable, inject } from '@angular/core';
import { OfflineBook } from '../../offline/offline-book';
import type { LoomView } from './loom-view';
import { LoomsideStore } from './loomside-store';
import { causeSections } from './stop-choices';
import { StopLog } from './stop-log';
import type { StopChoice, StopSheetData } from './stop-sheet';
import { StopSheetOpener } from './stop-sheet-opener';

/** Asks by the stop sheet what a loom stands for, and logs the answer. Make it with the page, beside the opener. */
@Injectable()
export class StopAsker {
  private readonly book = inject(OfflineBook);
  private readonly sheets = inject(StopSheetOpener);
  private readonly store = inject(LoomsideStore);
  private readonly log = inject(StopLog);

  other(view: LoomView): void {
    this.ask(view, {
      title: `Loom ${view.loom.number}: other stop`,
      mode: 'other',
      sections: this.sections(view, []),
      row: view.loom.row,
      maySendCall: view.call === null,
    });
  }

  standing(view: LoomView, cause: string): void {
    this.ask(view, {
      title: `Loom ${view.loom.number} still stands`,
      mode: 'standing',
      cause: { cause, name: this.store.causeName(cause) },
      sections: [],
      row: view.loom.row,
      maySendCall: false,
    });
  }

  change(view: LoomView): void {
    this.ask(view, {
      title: `Loom ${view.loom.number}: what does it stand for?`,
      mode: 'change',
      sections: this.sections(view, [view.standing?.cause ?? '']).filter(
        (section) => section.group !== 'shed',
      ),
      row: view.loom.row,
      maySendCall: false,
    });
  }

  private sections(view: LoomView, leaveOut: readonly string[]) {
    const battery = this.book.loomVersionOf(view.loom.id)?.battery ?? false;
    const often = this.book.commonCauses(view.loom.id);
    return causeSections(this.book.causes(), { battery, leaveOut, often });
  }

  private ask(view: LoomView, asked: Omit<StopSheetData, 'chosen'>): void {
    const data: StopSheetData = { ...asked, chosen: (choice) => void this.carryOut(view, choice) };
    this.sheets.open(data).catch(() => this.log.sheetMissing(view.loom));
  }

  private carryOut(view: LoomView, choice: StopChoice): Promise<void> {
    const { loom } = view;
    switch (choice.act) {
      case 'counted':
        return this.log.count(loom, choice.cause);
      case 'standing':
        return this.log.stand(loom, choice.cause, choice.minutesAgo);
      case 'shed-stop':
        return this.log.shedStop(loom, choice.cause, choice.minutesAgo, choice.scope);
      case 'change':
        return this.log.changeCause(view, choice.cause);
      case 'call':
        return this.log.call(view);
    }
  }
}
