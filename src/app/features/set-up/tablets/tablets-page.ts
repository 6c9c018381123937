import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { TabletCode } from '@shared/contract/one-time';
import type { DeviceRow } from '@shared/contract/session';
import { Clock } from '../../../core/clock';
import { DevicesClient } from '../../../core/devices-client';
import { loadOf, type ReportLoad } from '../../../core/report-load';
import { SessionStore } from '../../../core/session-store';
import { EmptyState } from '../../../ui/empty-state';
import { ReportTrouble } from '../../../ui/report-trouble';
import { TabletCodeCard } from '../../../ui/tablet-code-card';
import { ChoiceField } from '../common/choice-field';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { TABLET_LABELS, tabletForm } from './tablet-form';
import { TabletsList } from './tablets-list';

/** How often the list is fetched while a code waits for its tablet, ms. */
const LOOK_FOR_TABLET = 5_000;

/** The mill's tablets, and the code that makes another browser one. */
@Component({
  selector: 'app-tablets-page',
  imports: [
    ChoiceField,
    EmptyState,
    FormFoot,
    MatButton,
    ReportTrouble,
    RoomHeading,
    RouterLink,
    TabletCodeCard,
    TabletsList,
    TextField,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="Tablets"
      words="On a registered tablet weavers and tacklers sign in with works number and PIN, and log with or without network. Each belongs to one shed."
    >
      @if (!isTablet()) {
        <a matButton="outlined" routerLink="/tablet">Make this browser a tablet</a>
      }
    </app-room-heading>
    @if (sheds().length === 0) {
      <app-empty-state heading="No shed yet" words="A tablet belongs to a shed. Add the shed first.">
        <a matButton="filled" routerLink="/set-up/looms">Add a shed</a>
      </app-empty-state>
    } @else if (code(); as made) {
      <app-tablet-code-card [code]="made" [now]="now()" (done)="finish()" />
    } @else {
      <form (submit)="make(); $event.preventDefault()" novalidate>
        <h2>Register a tablet</h2>
        <div class="fields">
          <app-text-field
            [label]="labels.name"
            [control]="form.controls.name"
            placeholder="Alley A, north end"
            hint="By which it is found again."
          />
          <app-choice-field
            [label]="labels.shedId"
            [control]="form.controls.shedId"
            [choices]="sheds()"
            unchosen="Choose a shed"
          />
        </div>
        <app-form-foot label="Make a code for it" />
      </form>
    }
    <app-report-trouble
      [state]="load().state"
      [sentence]="load().sentence"
      [kept]="load().value !== null"
      (retry)="fetch()"
    />
    @if (load().value; as devices) {
      <app-tablets-list [devices]="devices" [sheds]="known().sheds" (changed)="fetch()" />
    }
  `,
  styleUrls: ['../common/room.scss', '../common/form.scss'],
})
export class TabletsPage {
  private readonly client = inject(DevicesClient);
  private readonly saver = inject(FormSaver);
  private readonly setUp = inject(SetUpStore);
  private readonly clock = inject(Clock);

  protected readonly isTablet = inject(SessionStore).isTablet;
  protected readonly labels = TABLET_LABELS;
  protected readonly known = this.setUp.known;
  protected readonly now = this.clock.tick;
  protected readonly sheds = computed(() =>
    this.known().sheds.map(({ id, name }) => ({ value: id, words: name })),
  );
  protected readonly load = signal<ReportLoad<readonly DeviceRow[]>>({
    state: 'loading',
    value: null,
    sentence: '',
  });
  protected readonly code = signal<TabletCode | null>(null);
  private readonly onlyShed = () => (this.sheds().length === 1 ? (this.sheds()[0]?.value ?? '') : '');
  protected readonly form = tabletForm(this.onlyShed(), () =>
    (this.load().value ?? []).filter(({ revoked }) => !revoked).map(({ name }) => name),
  );

  constructor() {
    void this.fetch();
    keepUnsaved(() => this.form.dirty);
    // The tablet is registered elsewhere: without looking, this page would go on offering a code that was used.
    effect((onCleanup) => {
      if (!this.code()) return;
      const before = new Set((untracked(this.load).value ?? []).map(({ id }) => id));
      const looking = setInterval(() => void this.look(before), LOOK_FOR_TABLET);
      onCleanup(() => {
        clearInterval(looking);
      });
    });
  }

  private async look(before: ReadonlySet<string>): Promise<void> {
    await this.fetch();
    if (this.code() && (this.load().value ?? []).some(({ id }) => !before.has(id))) await this.finish();
  }

  protected async fetch(): Promise<void> {
    const answer = await this.client.devices();
    const devices = answer.kind === 'ok' ? { ...answer, body: answer.body.devices } : answer;
    this.load.update(({ value }) => loadOf<readonly DeviceRow[]>(devices, value));
  }

  protected async make(): Promise<void> {
    const { name, shedId } = this.form.getRawValue();
    const made = await this.saver.send(this.form, () => this.client.newCode({ name: name.trim(), shedId }));
    if (made) this.code.set(made);
  }

  /** The tablet may be in the list by now. */
  protected async finish(): Promise<void> {
    this.code.set(null);
    this.form.reset({ name: '', shedId: this.onlyShed() });
    await this.fetch();
  }
}
