import {
  ChangeDetectionStrategy,
  Component,
  computed,
  input,
  linkedSignal,
  output,
  untracked,
} from '@angular/core';
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
  styleUrls: ['../../ui/asked.scss', './pern-counter.scss'],
})
export class PernCounter {
  /** What is counted: another, and the count begins anew. */
  readonly of = input.required<string>();
  /** Perns that were logged by taps. */
  readonly taps = input.required<number>();
  /** One count for several looms: it is shared out by their picks. */
  readonly shared = input(false);
  readonly busy = input(false);
  /** What was half typed before, "baskets odd". */
  readonly begun = input('');
  readonly typing = output<string>();
  readonly counted = output<number>();
  readonly tapsAreAll = output<void>();

  protected readonly baskets = linkedSignal<string, string>({
    source: this.of,
    computation: () => untracked(this.begun).split(' ')[0] || '0',
  });
  protected readonly odd = linkedSignal<string, string>({
    source: this.of,
    computation: () => untracked(this.begun).split(' ')[1] || '0',
  });
  /** The question that stands, of just this count; empty: none. */
  protected readonly asked = linkedSignal<string, string>({
    source: () => `${this.of()} ${this.baskets()} ${this.odd()}`,
    computation: () => '',
  });
  protected readonly count = computed(() => countPerns(this.baskets(), this.odd()));
  protected readonly inAll = computed(() => {
    const { total } = this.count();
    if (total === null) return 'No count yet';
    return total === 1 ? 'Save: 1 pern' : `Save: ${formatCount(total)} perns`;
  });

  protected moveBaskets(by: number): void {
    this.type(stepped(this.baskets(), by), this.odd());
  }

  protected moveOdd(by: number): void {
    this.type(this.baskets(), stepped(this.odd(), by));
  }

  protected type(baskets: string, odd: string): void {
    this.baskets.set(baskets);
    this.odd.set(odd);
    const plain = /^\d*$/.test(baskets) && /^\d*$/.test(odd);
    if (plain) this.typing.emit(`${baskets} ${odd}`);
  }

  /** The unlikely is asked about first. */
  protected keep(): void {
    const { total, question } = this.count();
    if (total === null) return;
    if (question && this.asked() === '') this.asked.set(question);
    else this.counted.emit(total);
  }
}
