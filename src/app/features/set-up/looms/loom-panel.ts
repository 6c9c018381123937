import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { Unsaved } from '../common/unsaved';
import { ChangeFactsForm } from './change-facts-form';
import { FactsHistory } from './facts-history';
import { OnLoomForm } from './on-loom-form';
import { PlaceForm } from './place-form';
import { UntilForm } from './until-form';

type Act = 'facts' | 'on-loom' | 'place' | 'until';

/** What can be changed of the looms that are chosen. */
@Component({
  selector: 'app-loom-panel',
  imports: [ChangeFactsForm, FactsHistory, MatButton, OnLoomForm, PlaceForm, UntilForm],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './loom-panel.html',
  styleUrls: ['./looms-page.scss', './loom-panel.scss'],
  host: { class: 'card', role: 'region', '[attr.aria-label]': 'heading()' },
})
export class LoomPanel {
  readonly looms = input.required<readonly Loom[]>();
  readonly closed = output<void>();

  private readonly unsaved = inject(Unsaved);
  private readonly ids = computed(() =>
    this.looms()
      .map((loom) => loom.id)
      .join(),
  );
  protected readonly act = linkedSignal<string, Act | null>({ source: this.ids, computation: () => null });
  /** What was done last; gone with another choice of looms. */
  protected readonly done = linkedSignal<string, string>({ source: this.ids, computation: () => '' });
  protected readonly only = computed(() => (this.looms().length === 1 ? this.looms()[0] : undefined));
  protected readonly heading = computed(() => {
    const only = this.only();
    if (only) return `Loom ${only.number}`;
    const numbers = this.looms().map((loom) => loom.number);
    return `${numbers.length} looms: ${numbers.slice(0, 12).join(', ')}${numbers.length > 12 ? ' …' : ''}`;
  });
  protected readonly acts = computed<readonly { act: Act; words: string }[]>(() => [
    { act: 'facts', words: 'Speed, clock and the rest' },
    { act: 'on-loom', words: 'On the loom now' },
    ...(this.only() ? [{ act: 'place', words: 'Number and place' } as const] : []),
    { act: 'until', words: 'Out of use' },
  ]);

  protected async begin(act: Act | null): Promise<void> {
    if (!(await this.unsaved.mayLeave())) return;
    this.done.set('');
    this.act.set(act === this.act() ? null : act);
  }

  protected finish(words: string): void {
    this.act.set(null);
    this.done.set(words);
  }
}
