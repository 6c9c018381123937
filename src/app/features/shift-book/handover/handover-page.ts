import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  linkedSignal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import type { NOTE_ABOUT } from '@shared/entries/entry';
import { formatMinutes } from '@shared/figures/format';
import { isNoFigure } from '@shared/figures/no-figure';
import { Clock } from '../../../core/clock';
import { formatMoment } from '../../../core/dates';
import { reportLoad } from '../../../core/report-load';
import { SessionStore } from '../../../core/session-store';
import { BookReach } from '../../../offline/book-reach';
import { OfflineBook } from '../../../offline/offline-book';
import { ScreenDrafts } from '../../../offline/screen-drafts';
import { ShedBook } from '../../../offline/shed-book';
import { EmptyState } from '../../../ui/empty-state';
import { sayBy } from '../say';
import { ShiftHeading } from '../shift-heading';
import { ShiftWriter } from '../shift-writer';
import { AheadClient } from './ahead-client';
import { handoverOf } from './handover';

type About = (typeof NOTE_ABOUT)[number];
/** Warps that run out before the next shift has ended. */
const AHEAD = 12 * 3_600_000;

/** What one foreman tells the next: what the book knows, what is asked for, the foreman's own words. */
@Component({
  selector: 'app-handover-page',
  imports: [EmptyState, MatButton, MatIcon, RouterLink, ShiftHeading],
  providers: [ShiftWriter],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './handover-page.html',
  styleUrls: ['../back-link.scss', '../form.scss', './handover-page.scss'],
  host: { class: 'page' },
})
export class HandoverPage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();

  protected readonly book = inject(OfflineBook);
  protected readonly writer = inject(ShiftWriter);
  private readonly shed = inject(ShedBook);
  private readonly drafts = inject(ScreenDrafts);
  private readonly session = inject(SessionStore);
  private readonly aheadClient = inject(AheadClient);
  private readonly clock = inject(Clock);
  protected readonly now = this.clock.tick;
  protected readonly noteLength = LIMITS.textLength;

  protected readonly shift = computed(() => this.book.shifts().find(({ key }) => key === this.key()) ?? null);
  protected readonly shedName = computed(
    () => this.book.reference().sheds.find(({ id }) => id === this.shift()?.shedId)?.name ?? '',
  );
  private readonly otherShed = computed(() => {
    const key = this.key();
    const shed = this.book.reference().sheds.find(({ id }) => key.startsWith(`${id}:`));
    return shed && shed.id !== this.book.shedId() ? shed.id : null;
  });
  protected readonly say = computed(() => sayBy(this.book.reference(), this.book.people()));
  protected readonly handover = computed(() => {
    const shift = this.shift();
    if (!shift) return null;
    const lines = this.book.looms().flatMap(({ id }) => this.book.lineOf(id, shift) ?? []);
    return handoverOf(this.shed.eventsOf(shift), lines, this.book.looms(), this.say());
  });
  protected readonly calls = computed(() => {
    const shift = this.shift();
    if (!shift) return [];
    return this.book.looms().flatMap((loom) => {
      const call = this.shed.callOf(loom.id, shift);
      const minutes = call
        ? Math.max(0, Math.floor((Math.min(this.now(), shift.endsAt) - call.at) / 60_000))
        : 0;
      return call
        ? [
            {
              id: call.id,
              loom: loom.number,
              words: `since ${this.say().time(call.at)}, ${formatMinutes(minutes)}`,
            },
          ]
        : [];
    });
  });
  private readonly aheadLoad = reportLoad(
    computed(() => this.shift()?.shedId ?? null),
    inject(BookReach).changed,
    (shedId, signal) => this.aheadClient.ahead(shedId, signal),
  );
  protected readonly aheadState = computed(() => this.aheadLoad().state);
  protected readonly beams = computed(() => {
    const ahead = this.aheadLoad().value;
    const shift = this.shift();
    if (!ahead || !shift) return [];
    const zone = this.book.reference().mill.timeZone;
    return ahead.beams.flatMap(({ loomNumber, clothName, warpName, expected }) =>
      isNoFigure(expected) || expected > shift.endsAt + AHEAD
        ? []
        : [
            {
              loomNumber,
              words: `${warpName ?? clothName}, about ${formatMoment(expected, this.now(), zone)}`,
            },
          ],
    );
  });

  protected readonly watchLoom = linkedSignal<string, string>({ source: this.key, computation: () => '' });
  protected readonly watchWords = linkedSignal<string, string>({ source: this.key, computation: () => '' });
  protected readonly nearMiss = linkedSignal<string, string>({ source: this.key, computation: () => '' });
  protected readonly humidity = linkedSignal<string, string>({ source: this.key, computation: () => '' });
  protected readonly words = linkedSignal<string, string>({ source: this.key, computation: () => '' });
  protected readonly humidityProblem = computed(() => {
    const said = this.humidity().trim().replace(',', '.');
    if (said === '') return '';
    const value = Number(said);
    return value >= 1 && value <= 100 ? '' : 'Relative humidity is a number from 1 to 100.';
  });
  protected readonly noteMine = computed(() => this.handover()?.note?.by === this.session.person()?.id);
  protected readonly readByMe = computed(() =>
    (this.handover()?.note?.readBy ?? []).some(({ by }) => by === this.session.person()?.id),
  );

  constructor() {
    effect(() => {
      const shed = this.otherShed();
      if (shed !== null) untracked(() => this.book.chooseShed(shed));
    });
    effect(() => {
      const name = this.draftName();
      untracked(() => void this.readDraft(name));
    });
  }

  protected typeWords(words: string): void {
    this.words.set(words);
    // Not durable is not lost: it stands in the field, and saving it says so if it cannot.
    this.drafts.keep(this.draftName(), words === '' ? null : words).catch(() => undefined);
  }

  protected async addWatch(): Promise<void> {
    const loomId = this.watchLoom() || (this.book.looms()[0]?.id ?? '');
    const text = this.watchWords().trim();
    if (text && (await this.log('watch', text, { loomId }))) this.watchWords.set('');
  }

  protected async addNearMiss(text: string): Promise<void> {
    if (text.trim() && (await this.log('near-miss', text.trim()))) this.nearMiss.set('');
  }

  protected async addHumidity(): Promise<void> {
    const said = this.humidity().trim().replace(',', '.');
    if (said && !this.humidityProblem() && (await this.log('humidity', said))) this.humidity.set('');
  }

  protected async hand(): Promise<void> {
    const text = this.words().trim();
    if (text && (await this.log('handover', text))) this.typeWords('');
  }

  protected async confirm(noteId: string): Promise<void> {
    await this.log('read', 'Read', { noteId });
  }

  private async log(
    about: About,
    text: string,
    more: { loomId?: string; noteId?: string } = {},
  ): Promise<boolean> {
    const shift = this.shift();
    if (!shift) return false;
    const { key: shiftKey, shedId } = shift;
    return this.writer.save([{ kind: 'note', about, text, shiftKey, shedId, ...more }]);
  }

  private draftName(): string {
    return `handover:${this.key()}`;
  }

  private async readDraft(name: string): Promise<void> {
    const kept = await this.drafts.read(name).catch(() => null);
    if (typeof kept === 'string' && name === this.draftName() && this.words() === '') this.words.set(kept);
  }
}
