import { Injectable, Injector, PendingTasks, afterNextRender, inject } from '@angular/core';
import type * as Opening from './open-stop-sheet';
import type { StopSheetData } from './stop-sheet';

/**
 * Opens the stop sheet. It is fetched once the looms stand on the screen, so that it is not in their way: it and what
 * a sheet over the page needs are a tenth of Loomside's download. Make it with the page.
 */
@Injectable()
export class StopSheetOpener {
  private readonly injector = inject(Injector);
  private readonly tasks = inject(PendingTasks);
  private sheet: Promise<typeof Opening> | null = null;

  constructor() {
    afterNextRender(() => {
      this.fetch().catch(() => undefined);
    });
  }

  /** Resolves when it is open; rejects where it was never fetched and there is no network. */
  open(data: StopSheetData): Promise<void> {
    const done = this.tasks.add();
    return this.fetch()
      .then(({ openStopSheet }) => openStopSheet(this.injector, data))
      .finally(done);
  }

  private fetch(): Promise<typeof Opening> {
    this.sheet ??= import('./open-stop-sheet').catch((error: unknown) => {
      this.sheet = null;
      throw error;
    });
    return this.sheet;
  }
}
