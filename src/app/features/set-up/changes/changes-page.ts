import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { changeRecordSchema, type RecordedChange } from '@shared/contract/set-up';
import { debounceTime, distinctUntilChanged } from 'rxjs';
import { ApiClient } from '../../../core/api-client';
import { outcomeOf } from '../../../core/answer';
import { EmptyState } from '../../../ui/empty-state';
import { ErrorState } from '../../../ui/error-state';
import { longMoment } from '../common/moments';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { differences, headlineOf, wholeWords, type Namer } from './change-words';

/** Who changed what, when, before and after. Nothing here can be edited, by anybody. */
@Component({
  selector: 'app-changes-page',
  imports: [EmptyState, ErrorState, MatButton, ReactiveFormsModule, RoomHeading, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './changes-page.html',
  styleUrl: './changes-page.scss',
})
export class ChangesPage {
  private readonly api = inject(ApiClient);
  private readonly store = inject(SetUpStore);

  protected readonly search = new FormControl('', { nonNullable: true });
  protected readonly found = signal<readonly RecordedChange[]>([]);
  protected readonly more = signal(false);
  protected readonly state = signal<'loading' | 'ready' | 'failed'>('loading');
  protected readonly failure = signal('');
  private asked = 0;

  private readonly namer = computed<Namer>(() => {
    const setUp = this.store.known();
    const names = new Map<string, string>([
      ...setUp.sheds.map((one) => [one.id, one.name] as const),
      ...setUp.looms.map((one) => [one.id, `loom ${one.number}`] as const),
      ...setUp.cloths.map((one) => [one.id, one.name] as const),
      ...setUp.beams.map((one) => [one.id, one.name] as const),
      ...setUp.patterns.map((one) => [one.id, one.name] as const),
    ]);
    const zone = this.store.timeZone();
    const units = this.store.units();
    return { units, nameOf: (id) => names.get(id) ?? null, moment: (at) => longMoment(at, zone) };
  });
  protected readonly rows = computed(() => {
    const namer = this.namer();
    return this.found().map((change) => ({
      seq: change.seq,
      headline: headlineOf(change),
      by: change.byName,
      when: namer.moment(change.at),
      effective: change.effectiveAt === null ? '' : `holds from ${namer.moment(change.effectiveAt)}`,
      reason: change.reason ?? '',
      whole: wholeWords(change, namer),
      differences: differences(change, namer),
    }));
  });

  constructor() {
    void this.ask(true);
    this.search.valueChanges
      .pipe(debounceTime(250), distinctUntilChanged(), takeUntilDestroyed())
      .subscribe(() => void this.ask(true));
  }

  /** `anew`: the newest; else those before the oldest that is shown. */
  protected async ask(anew: boolean): Promise<void> {
    const turn = ++this.asked;
    const oldest = this.found().at(-1)?.seq;
    const q = this.search.value.trim().slice(0, 100);
    this.state.set('loading');
    const answer = await this.api.get('/api/set-up/changes', changeRecordSchema, {
      q: q || undefined,
      before: anew || oldest === undefined ? undefined : oldest,
    });
    if (turn !== this.asked) return;
    if (answer.kind !== 'ok') {
      const outcome = outcomeOf(answer);
      this.failure.set(outcome.ok ? '' : outcome.sentence);
      this.state.set('failed');
      return;
    }
    this.found.update((before) => (anew ? answer.body.changes : [...before, ...answer.body.changes]));
    this.more.set(answer.body.more);
    this.state.set('ready');
  }
}
