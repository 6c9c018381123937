import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import type { ClothVersion } from '@shared/contract/reference';
import { clothFactsSchema, type ClothFacts } from '@shared/contract/set-up';
import { formatCount } from '@shared/figures/format';
import { Clock } from '../../../core/clock';
import type { Answer } from '../../../core/answer';
import { EmptyState } from '../../../ui/empty-state';
import { ChoiceField } from '../common/choice-field';
import { problemOfField } from '../common/field';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { FromMoment } from '../common/from-moment';
import { versionToEdit } from '../common/in-force';
import { NumberField } from '../common/number-field';
import { PERCENT, QUANTITIES, type Units } from '../common/quantity';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { VersionList } from '../common/version-list';
import { withUnit } from '../common/with-unit';
import { clothFigures } from './cloth-figures';
import {
  CLOTH_LABELS,
  WEFT_LABELS,
  clothAdvice,
  clothFacts,
  clothForm,
  shareLeft,
  weftForm,
} from './cloth-form';
import {
  CONTRACTIONS,
  COUNTS,
  COUNT_CHOICES,
  USUAL_COUNT,
  otherContraction,
  type Contraction,
} from './cloth-quantities';

/** One cloth: its construction, what that comes to, and what held when. */
@Component({
  selector: 'app-cloth-page',
  imports: [
    ChoiceField,
    EmptyState,
    FormFoot,
    FromMoment,
    MatButton,
    MatIcon,
    NumberField,
    ReactiveFormsModule,
    RoomHeading,
    RouterLink,
    TextField,
    VersionList,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './cloth-page.html',
  styleUrls: ['../common/room.scss', '../common/form.scss', './cloth-page.scss'],
})
export class ClothPage {
  /** From the address: a cloth's id, or `new`. */
  readonly id = input.required<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);
  private readonly injector = inject(Injector);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  protected readonly labels = CLOTH_LABELS;
  protected readonly weftLabels = WEFT_LABELS;
  protected readonly contractions = CONTRACTIONS;
  protected readonly counts = COUNTS;
  protected readonly countChoices = COUNT_CHOICES;
  protected readonly percent = PERCENT;
  protected readonly ways: readonly { said: Contraction; words: string }[] = [
    { said: 'crimp', words: 'as crimp, of the cloth’s length' },
    { said: 'take-up', words: 'as take-up, of the warp’s length' },
  ];
  protected readonly said = signal<Contraction>('crimp');

  protected readonly cloth = computed(() => this.store.known().cloths.find((one) => one.id === this.id()));
  protected readonly isThere = computed(() => this.id() === 'new' || this.cloth() !== undefined);
  private readonly versions = computed(() =>
    this.store.known().clothVersions.filter((one) => one.clothId === this.id()),
  );
  private readonly stored = computed(() => versionToEdit(this.versions(), this.clock.tick()));
  /** One form a cloth, as it was when it was opened: what comes meanwhile does not undo what is typed. */
  protected readonly form = computed(() => {
    const id = this.id();
    return untracked(() => {
      const [cloth, facts] = [this.cloth(), this.stored()];
      const form = clothForm(
        cloth && facts ? { name: cloth.name, facts } : null,
        USUAL_COUNT[this.store.units()],
        () => this.store.known().cloths.flatMap((one) => (one.id === id ? [] : one.name)),
      );
      form.controls.retired.setValue(cloth?.retired ?? false);
      return form;
    });
  });
  private readonly turns = turnsOf(this.form);
  private readonly facts = computed(() => {
    this.turns();
    return clothFacts(this.form());
  });
  protected readonly factsChanged = computed(() => {
    const [facts, stored] = [this.facts(), this.stored()];
    this.turns();
    if (!stored) return true;
    return facts === null ? this.form().dirty : JSON.stringify(facts) !== JSON.stringify(factsOnly(stored));
  });
  protected readonly figures = computed(() => {
    const facts = this.facts();
    return facts ? clothFigures(facts, this.store.units()) : [];
  });
  protected readonly other = computed(() => {
    this.turns();
    return otherContraction(this.form().controls.crimp.value, this.said());
  });
  protected readonly advice = computed(() => {
    this.turns();
    return clothAdvice(this.form());
  });
  protected readonly weftsProblem = computed(() => {
    this.turns();
    const { wefts } = this.form().controls;
    return wefts.dirty || wefts.touched ? (wefts.errors ? problemOfField(wefts, 'Wefts') : '') : '';
  });
  protected readonly history = computed(() =>
    this.versions().map((version) => ({
      id: version.id,
      effectiveAt: version.effectiveAt,
      words: versionWords(version, this.store.units()),
    })),
  );

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected addWeft(): void {
    const { wefts } = this.form().controls;
    wefts.push(weftForm(null, wefts.controls.at(-1)?.controls.system.value ?? 'tex', shareLeft(wefts)));
    wefts.markAsDirty();
    const index = wefts.length - 1;
    afterNextRender(
      () => this.host.nativeElement.querySelector<HTMLElement>(`[data-weft="${index}"] input`)?.focus(),
      { injector: this.injector },
    );
  }

  protected removeWeft(index: number): void {
    const { wefts } = this.form().controls;
    wefts.removeAt(index);
    wefts.markAsDirty();
    // The button that was pressed is gone with its weft.
    afterNextRender(() => this.host.nativeElement.querySelector<HTMLElement>('.more')?.focus(), {
      injector: this.injector,
    });
  }

  protected async save(): Promise<void> {
    const form = this.form();
    const changed = await this.saver.send(form, () => this.ask(), { under: 'facts' });
    if (!changed) return;
    const at = this.cloth()?.id ?? changed[0];
    await this.router.navigate(['/set-up/cloths'], { queryParams: { at } });
  }

  /** What is new goes to its own route: the name to the cloth, the construction to a version from its moment on. */
  private async ask(): Promise<Answer<readonly string[]>> {
    const { name, retired, effectiveAt } = this.form().getRawValue();
    const [cloth, facts] = [this.cloth(), clothFacts(this.form())];
    if (!cloth) return idsOf(await this.store.change('POST', '/cloths', { name: name.trim(), facts }));
    if (this.factsChanged()) {
      const body = { effectiveAt: effectiveAt ?? Math.round(this.clock.correctedNow()), facts };
      const answer = idsOf(await this.store.change('POST', `/cloths/${cloth.id}/versions`, body));
      if (answer.kind !== 'ok') return answer;
    }
    if (name.trim() === cloth.name && retired === (cloth.retired ?? false))
      return { kind: 'ok', body: [cloth.id] };
    return idsOf(await this.store.change('PATCH', `/cloths/${cloth.id}`, { name: name.trim(), retired }));
  }
}

function idsOf(answer: Answer<{ ids: readonly string[] }>): Answer<readonly string[]> {
  return answer.kind === 'ok' ? { kind: 'ok', body: answer.body.ids } : answer;
}

/** In the order of the schema, as the form says it: for comparing. */
function factsOnly(version: ClothVersion): ClothFacts {
  return clothFactsSchema.parse(version);
}

function versionWords(version: ClothVersion, units: Units): string {
  const sett = (value: number) => withUnit(value, QUANTITIES.sett[units]);
  return [
    `${formatCount(version.ends)} ends`,
    `${sett(version.picksPerCmOnLoom)} on the loom, ${sett(version.picksPerCmLoomState)} in loom state`,
    withUnit(version.reedWidthCm, QUANTITIES.width[units]),
    `crimp ${withUnit(version.crimp, PERCENT)}`,
    version.wefts.map((weft) => weft.name).join(', '),
  ].join('; ');
}
