import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  afterRenderEffect,
  inject,
  input,
  output,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { LoomRecord } from '@shared/contract/shift-records';
import { BeforeAfter } from './before-after';
import { CorrectionForm } from './correction-form';
import type { StoryEntry } from './loom-story';
import { ShiftWriter } from './shift-writer';

/** A line's record in order of time: who said what, what was corrected, what waits and why. */
@Component({
  selector: 'app-loom-story',
  imports: [BeforeAfter, CorrectionForm, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './loom-story-list.html',
  styleUrl: './loom-story-list.scss',
})
export class LoomStory {
  readonly story = input.required<readonly StoryEntry[]>();
  readonly record = input.required<LoomRecord>();
  /** The entry whose form is open. */
  readonly correcting = input<string | null>(null);
  readonly mayCorrect = input(true);
  readonly correct = output<string>();
  readonly leave = output<void>();

  protected readonly writer = inject(ShiftWriter);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  constructor() {
    // Opened from a flag further up: the form comes into view, and the keyboard with it.
    afterRenderEffect(() => {
      if (this.correcting() === null) return;
      const form = this.host.nativeElement.querySelector<HTMLElement>('app-correction-form');
      form?.scrollIntoView({ block: 'nearest' });
      form?.querySelector<HTMLElement>('input, select')?.focus({ preventScroll: true });
    });
  }
}
