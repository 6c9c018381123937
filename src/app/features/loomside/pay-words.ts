import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { LIMITS } from '@shared/contract/limits';
import type { Shift } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';
import { SessionStore } from '../../core/session-store';
import { OfflineBook } from '../../offline/offline-book';
import { ErrorState } from '../../ui/error-state';
import { LoomsideStore } from './loomside-store';
import { payWordOf, picksOf, type PayWord } from './my-picks';
import { Saving } from './saving';

interface Row {
  readonly loomId: string;
  readonly number: number;
  readonly picks: number;
  /** How they were come by, where they were not simply read. */
  readonly made: string;
  readonly said: PayWord | null;
  /** Confirmed or queried as they stand now. */
  readonly settled: boolean;
}

/** The picks of a shift that I am paid for, loom by loom: confirmed by one tap, or queried with words. */
@Component({
  selector: 'app-pay-words',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ErrorState, MatButton],
  templateUrl: './pay-words.html',
  styleUrl: './pay-words.scss',
})
export class PayWords {
  readonly shift = input.required<Shift>();

  private readonly book = inject(OfflineBook);
  private readonly session = inject(SessionStore);
  private readonly store = inject(LoomsideStore);
  protected readonly saving = new Saving();
  protected readonly format = formatCount;
  protected readonly wordsLength = LIMITS.textLength;
  /** The loom that is being queried. */
  protected readonly queried = signal<string | null>(null);

  /** The looms that I minded for a while before their end was read. */
  private readonly minded = computed(() => {
    const me = this.session.person()?.id;
    if (!me) return [];
    return this.store
      .setIn(this.shift())
      .map(({ loom, line }) => ({ loom, mine: picksOf(line, me) }))
      .filter(({ mine }) => mine.minded);
  });
  protected readonly rows = computed<readonly Row[]>(() => {
    const shift = this.shift();
    return this.minded().flatMap(({ loom, mine: { picks, estimated, agreed } }) => {
      if (picks === null) return [];
      const said = payWordOf(this.book.recentOf(loom.id, shift), shift.key);
      return [
        {
          loomId: loom.id,
          number: loom.number,
          picks,
          made: agreed ? 'agreed' : estimated ? 'shared by running time' : '',
          said,
          settled: said?.picks === picks,
        },
      ];
    });
  });
  /** Looms whose picks are not known yet. */
  protected readonly unread = computed(() => this.minded().length - this.rows().length);
  protected readonly total = computed(() => this.rows().reduce((sum, row) => sum + row.picks, 0));
  protected readonly open = computed(() => this.rows().filter((row) => !row.settled));

  protected readonly confirmWords = computed(() => {
    const open = this.open().length;
    const picks = open === this.rows().length ? `, ${formatCount(this.total())} picks` : '';
    return `Confirm ${open === 1 ? '1 loom' : `${open} looms`}${picks}`;
  });

  protected wordsOf(row: Row): string {
    const { said } = row;
    if (!said) return '';
    const what = said.word === 'confirmed' ? 'confirmed' : 'queried';
    const then = row.settled ? '' : ` at ${formatCount(said.picks)}, which has changed since`;
    return `${what}${then}${said.sent ? '' : ', not sent'}`;
  }

  protected async confirmAll(): Promise<void> {
    await this.say(this.open().map((row) => ({ row, word: 'confirmed' as const })));
  }

  protected async query(row: Row, words: string): Promise<void> {
    const said = words.trim();
    if (!said) {
      this.saving.say('Say in a few words what is wrong: the foreman reads it beside the loom’s line.');
      return;
    }
    if (await this.say([{ row, word: 'queried', words: said }])) this.queried.set(null);
  }

  private async say(
    all: readonly { row: Row; word: 'confirmed' | 'queried'; words?: string }[],
  ): Promise<boolean> {
    if (this.saving.busy()) return false;
    return this.saving.keep(() =>
      this.book.logAll(
        all.map(({ row, word, words }) => ({
          kind: 'pay-word',
          loomId: row.loomId,
          shiftKey: this.shift().key,
          word,
          picks: row.picks,
          ...(words !== undefined && { words }),
        })),
      ),
    );
  }
}
