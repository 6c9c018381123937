import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { MAT_BOTTOM_SHEET_DATA, MatBottomSheetRef } from '@angular/material/bottom-sheet';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { CAUTION } from '../../ui/caution';
import { CauseMark } from '../../ui/cause-mark';
import { SINCE_CHOICES, type CauseChoice, type CauseSection } from './stop-choices';

export interface StopSheetData {
  readonly title: string;
  readonly sections: readonly CauseSection[];
  /** other: any stop. change: the cause of what stands. standing: since when the named cause stands. */
  readonly mode: 'other' | 'change' | 'standing';
  /** For `standing`. */
  readonly cause?: { readonly cause: string; readonly name: string };
  readonly row: number;
  readonly maySendCall: boolean;
  /** Told at once: nothing that is logged waits for the sheet to slide away. */
  readonly chosen: (choice: StopChoice) => void;
}

export type ShedScope = 'looms' | 'row' | 'shed';
export type StopChoice =
  | { readonly act: 'counted'; readonly cause: string }
  | { readonly act: 'standing'; readonly cause: string; readonly minutesAgo: number }
  | {
      readonly act: 'shed-stop';
      readonly cause: string;
      readonly minutesAgo: number;
      readonly scope: ShedScope;
    }
  | { readonly act: 'change'; readonly cause: string }
  | { readonly act: 'call' };

type When = 'counted' | 0 | 5 | 15;

/** The sheet behind "Other stop": when, then which cause; two taps in all. */
@Component({
  selector: 'app-stop-sheet',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [CauseMark, MatButton, MatIcon],
  templateUrl: './stop-sheet.html',
  styleUrls: ['./cause-choices.scss', './stop-sheet.scss'],
})
export class StopSheet {
  private readonly sheet = inject<MatBottomSheetRef<StopSheet>>(MatBottomSheetRef);
  protected readonly data = inject<StopSheetData>(MAT_BOTTOM_SHEET_DATA);
  protected readonly caution = CAUTION;
  protected readonly sinceChoices = SINCE_CHOICES;
  protected readonly when = signal<When>(0);
  /** A shed stop asks what stands. */
  protected readonly shedCause = signal<CauseChoice | null>(null);

  protected choose(choice: CauseChoice): void {
    const when = this.when();
    if (this.data.mode === 'change') this.say({ act: 'change', cause: choice.cause });
    else if (choice.group === 'shed') this.shedCause.set(choice);
    else if (when === 'counted') this.say({ act: 'counted', cause: choice.cause });
    else this.say({ act: 'standing', cause: choice.cause, minutesAgo: when });
  }

  protected chooseScope(scope: ShedScope): void {
    const cause = this.shedCause()?.cause;
    const when = this.when();
    if (cause) this.say({ act: 'shed-stop', cause, minutesAgo: when === 'counted' ? 0 : when, scope });
  }

  protected standSince(minutesAgo: number): void {
    const cause = this.data.cause?.cause;
    if (cause) this.say({ act: 'standing', cause, minutesAgo });
  }

  protected call(): void {
    this.say({ act: 'call' });
  }

  protected close(): void {
    this.sheet.dismiss();
  }

  private say(choice: StopChoice): void {
    this.data.chosen(choice);
    this.sheet.dismiss();
  }
}
