import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed, toSignal } from '@angular/core/rxjs-interop';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import type { CauseVersion } from '@shared/contract/reference';
import { debounceTime, startWith } from 'rxjs';
import { newId } from '../../core/ids';
import type { EntryDraft } from '../../offline/entry-draft';
import { OfflineBook } from '../../offline/offline-book';
import { PhotoBook } from '../../offline/photo-book';
import { ScreenDrafts } from '../../offline/screen-drafts';
import { CAUTION } from '../../ui/caution';
import { CallLog, sentenceOf } from './call-log';
import { CallsStore } from './calls-store';
import { PhotoTaker } from './photo-taker';
import {
  OTHER_PART,
  RAN_WORDS,
  repairDraftSchema,
  repairForm,
  saidIn,
  wantingIn,
  type Ran,
} from './repair-form';

/** What was found and done at a loom: one record, saved in one act with the end of the call and the loom's running. */
@Component({
  selector: 'app-repair-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, MatIcon, PhotoTaker, ReactiveFormsModule, RouterLink],
  templateUrl: './repair-page.html',
  styleUrl: './form.scss',
  host: { class: 'page' },
})
export class RepairPage {
  /** From the address. */
  readonly loomId = input.required<string>();
  /** The call it is for; absent: nobody called. */
  readonly call = input<string>();

  private readonly router = inject(Router);
  private readonly book = inject(OfflineBook);
  private readonly photos = inject(PhotoBook);
  private readonly drafts = inject(ScreenDrafts);
  private readonly log = inject(CallLog);
  private readonly store = inject(CallsStore);

  protected readonly caution = CAUTION;
  protected readonly ranWords = RAN_WORDS;
  protected readonly otherPart = OTHER_PART;
  protected readonly form = repairForm();
  private readonly value = toSignal(this.form.valueChanges.pipe(startWith(this.form.value)));

  protected readonly loom = computed(() => this.store.loomById(this.loomId()));
  protected readonly cloth = computed(() => this.store.clothOf(this.loomId())?.name ?? '');
  protected readonly stands = computed(() => this.store.standingOf(this.loomId()));
  protected readonly causes = computed<readonly CauseVersion[]>(() =>
    this.book.causes().filter(({ attendedBy, group }) => attendedBy === 'tackler' || group === 'loom'),
  );
  protected readonly parts = computed(() =>
    (this.book.reference().parts ?? []).filter(({ retired }) => !retired),
  );
  protected readonly repairId = signal<string | null>(null);
  protected readonly photoIds = signal<readonly string[]>([]);
  protected readonly saving = signal(false);
  protected readonly tried = signal(false);
  protected readonly complaint = signal('');
  protected readonly wanting = computed(() => {
    this.value();
    return this.tried() ? wantingIn(this.form) : '';
  });
  protected readonly partIsOther = computed(() => this.value()?.partId === OTHER_PART);
  protected readonly flew = computed(() => this.value()?.flew === true);
  protected readonly endsStop = computed(() => {
    const ran = this.value()?.ran;
    return this.stands() !== null && (ran === 'well' || ran === 'watch');
  });
  private readonly draftName = computed(() => `repair:${this.loomId()}:${this.call() ?? ''}`);

  constructor() {
    effect(() => {
      const name = this.draftName();
      untracked(() => void this.bringBack(name));
    });
    this.form.valueChanges.pipe(debounceTime(250), takeUntilDestroyed()).subscribe(() => this.keepDraft());
    // Who taps away sooner than that loses no word either.
    inject(DestroyRef).onDestroy(() => this.keepDraft());
  }

  protected chooseRan(ran: Ran): void {
    this.form.controls.ran.setValue(ran);
  }

  protected async save(): Promise<void> {
    this.tried.set(true);
    const repairId = this.repairId();
    const loom = this.loom();
    if (this.form.invalid || this.saving() || repairId === null || !loom) return;
    this.saving.set(true);
    this.complaint.set('');
    try {
      const drafts = this.entries(repairId);
      const photoIds = this.photoIds();
      const entries = await this.photos.withRepair(photoIds, () => this.book.logAll(drafts));
      await this.drafts.keep(this.draftName(), null).catch(() => undefined);
      const batchId = entries[0]?.batchId;
      const photos =
        photoIds.length === 0
          ? ''
          : photoIds.length === 1
            ? ', with 1 photo'
            : `, with ${photoIds.length} photos`;
      this.log.said(
        `Loom ${loom.number}: repair saved${photos}`,
        batchId === undefined ? null : () => this.book.undoBatch(batchId),
      );
      await this.router.navigate(['/calls']);
    } catch (error) {
      this.complaint.set(sentenceOf(error));
    } finally {
      this.saving.set(false);
    }
  }

  /** The repair; the call's end, where nobody has said it; the loom's running, where it stood. */
  private entries(repairId: string): EntryDraft[] {
    const loomId = this.loomId();
    const call = this.call();
    const photoIds = [...this.photoIds()];
    const names = new Map(this.parts().map(({ id, name }) => [id, name]));
    const entries: EntryDraft[] = [
      {
        kind: 'repair',
        id: repairId,
        loomId,
        ...(call !== undefined && { targetId: call }),
        ...saidIn(this.form, (id) => names.get(id)),
        ...(photoIds.length > 0 && { photoIds }),
      },
    ];
    const loom = this.loom();
    const open = loom
      ? this.store
          .ofLoom(loom)()
          .find(({ id }) => id === call)
      : undefined;
    if (open) entries.push({ kind: 'attend', loomId, targetId: open.id, step: 'done' });
    const stands = this.stands();
    if (this.endsStop() && stands) entries.push({ kind: 'resume', loomId, targetId: stands.id });
    return entries;
  }

  private async bringBack(name: string): Promise<void> {
    const kept = repairDraftSchema.safeParse(await this.drafts.read(name).catch(() => null));
    if (name !== this.draftName()) return;
    if (kept.success) {
      const { repairId, ...value } = kept.data;
      this.form.setValue(value, { emitEvent: true });
      this.repairId.set(repairId);
      return;
    }
    this.form.reset();
    const cause = this.stands()?.cause;
    if (cause !== undefined && this.causes().some(({ causeId }) => causeId === cause))
      this.form.controls.cause.setValue(cause);
    this.repairId.set(newId());
    this.keepDraft();
  }

  private keepDraft(): void {
    const repairId = this.repairId();
    if (repairId === null || this.saving()) return;
    void this.drafts.keep(this.draftName(), { repairId, ...this.form.getRawValue() }).catch(() => undefined);
  }
}
