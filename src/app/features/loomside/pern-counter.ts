import { ChangeDetectionStrategy, Component, computed, input, linkedSignal, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { formatCount } from '@shared/figures/format';
import { countPerns, stepped } from './pern-count';

/** Counts a loom's perns by baskets and odd ones; what is no count gets a sentence, what is unlikely a question. */
@Component({
  selector: 'app-pern-counter',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, MatIcon],
  templateUrl: './pern-counter.html',
  styleUrl: './pern-counter.scss',
})
export class PernCounter {
  readonly loomId = input.required<string>();
  /** Perns that were logged by taps. */
  readonly taps = input.required<number>();
  readonly busy = input(false);
  readonly counted = output<number>();
  readonly tapsAreAll = output<void>();

  /** Another loom, another count. */
  protected readonly baskets = linkedSignal<string, string>({ source: this.loomId, computation: () => '0' });
  protected readonly odd = linkedSignal<string, string>({ source: this.loomId, computation: () => '0' });
  /** The question that stands, of just this count; empty: none. */
  protected readonly asked = linkedSignal<string, string>({
    source: () => `${this.loomId()} ${this.baskets()} ${this.odd()}`,
    computation: () => '',
  });
  protected readonly count = computed(() => countPerns(this.baskets(), this.odd()));
  protected readonly inAll = computed(() => {
    const { total } = this.count();
    if (total === null) return 'No count yet';
    return total === 1 ? '1 pern in all' : `${formatCount(total)} perns in all`;
  });

  protected moveBaskets(by: number): void {
    this.baskets.set(stepped(this.baskets(), by));
  }

  protected moveOdd(by: number): void {
    this.odd.set(stepped(this.odd(), by));
  }

  /** The unlikely is asked about first. */
  protected keep(): void {
    const { total, question } = this.count();
    if (total === null) return;
    if (question && this.asked() === '') this.asked.set(question);
    else this.counted.emit(total);
  }
}
