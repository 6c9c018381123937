import { ElementRef, Injectable, inject, signal } from '@angular/core';
import { FormArray, FormControl, FormGroup, type AbstractControl } from '@angular/forms';
import { sentenceOf, type Problem } from '@shared/contract/errors';
import { outcomeOf, type Answer } from '../../../core/answer';
import { SetUpStore } from './set-up-store';

/** Set-up is not kept on the device as entries are: what is typed lies in the form alone. */
const NOT_REACHED =
  'Not saved: the book cannot be reached from here. What you typed stays in this form while the page is open; try again when there is a network.';

export interface SaveOptions {
  /** Where in the body the form lies: `facts` for a form of `{ from, facts: {…} }`. */
  readonly under?: string;
  /** Fields that are named otherwise in the form than in the body: path in the body, name in the form. */
  readonly named?: Readonly<Record<string, string>>;
}

/**
 * Saves a form: says what is missing, sends it, marks the fields that the server finds wrong, fetches set-up anew.
 * One for a form's component (`providers: [FormSaver]`).
 */
@Injectable()
export class FormSaver {
  private readonly store = inject(SetUpStore);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly busy = signal(false);
  /** Why it is not saved; empty: nothing is wrong. */
  readonly failure = signal('');
  /** Something was saved here since the page was opened. */
  readonly saved = signal(false);

  /**
   * Sends `body()` below `/api/set-up`. Resolves with the ids that were made or touched; null: nothing is stored, and
   * the fields or `failure` say why.
   */
  save(
    form: FormGroup,
    method: 'POST' | 'PATCH' | 'DELETE',
    path: string,
    body: () => unknown,
    options: SaveOptions = {},
  ): Promise<readonly string[] | null> {
    return this.send(form, async () => this.store.change(method, path, body()), options).then(
      (answer) => answer?.ids ?? null,
    );
  }

  /** The same for a route outside set-up (people, tablets, mail): `ask` sends it. Null: nothing is stored. */
  async send<T>(
    form: FormGroup,
    ask: () => Promise<Answer<T>>,
    options: SaveOptions = {},
  ): Promise<T | null> {
    if (this.busy()) return null;
    this.failure.set('');
    this.saved.set(false);
    form.markAllAsTouched();
    judgeAnew(form);
    if (form.invalid) {
      this.focusFirst();
      return null;
    }
    this.busy.set(true);
    try {
      const answer = await ask();
      if (answer.kind === 'ok') {
        form.markAsPristine();
        form.markAsUntouched();
        this.saved.set(true);
        return answer.body;
      }
      this.tell(form, answer, options);
      return null;
    } finally {
      this.busy.set(false);
    }
  }

  private tell(
    form: FormGroup,
    answer: Exclude<Answer<unknown>, { kind: 'ok' }>,
    options: SaveOptions,
  ): void {
    if (answer.kind === 'problem' && answer.problem.fields?.length) {
      const { fields } = answer.problem;
      const homeless = markFields(form, answer.problem, options);
      // "Mend what is marked" would be untrue where nothing is.
      const none = fields.every(({ message }) => homeless.includes(message));
      this.failure.set([none ? 'Nothing was stored.' : sentenceOf(answer.code), ...homeless].join(' '));
      this.focusFirst();
      return;
    }
    const outcome = outcomeOf(answer);
    this.failure.set(outcome.ok ? '' : outcome.code === 'offline' ? NOT_REACHED : outcome.sentence);
  }

  /** Puts the cursor where something is to be mended, once the page shows what. */
  private focusFirst(): void {
    setTimeout(() => {
      const wrong = this.host.nativeElement.querySelector<HTMLElement>(
        '[aria-invalid="true"], .ng-invalid:is(input, select, textarea)',
      );
      wrong?.focus();
    });
  }
}

/** What the server said of a field last time is no reason not to ask it again. */
function judgeAnew(control: AbstractControl): void {
  if (control instanceof FormGroup || control instanceof FormArray)
    for (const child of Object.values(control.controls) as AbstractControl[]) judgeAnew(child);
  control.updateValueAndValidity({ onlySelf: true });
}

/** Puts each of the server's sentences on its field. What has none here is handed back, for the form to say itself. */
export function markFields(form: FormGroup, problem: Problem, options: SaveOptions = {}): readonly string[] {
  const homeless: string[] = [];
  for (const { path, message } of problem.fields ?? []) {
    const control = controlAt(form, path, options);
    if (!control) {
      homeless.push(message);
      continue;
    }
    control.setErrors({ ...control.errors, server: message });
    control.markAsTouched();
  }
  return [...new Set(homeless)];
}

/** A field of the form; a group shows no sentence of its own, so it is none. */
function controlAt(form: FormGroup, path: string, { under, named }: SaveOptions): AbstractControl | null {
  const whole = path.replaceAll('/', '.');
  const inside = under !== undefined && whole.startsWith(`${under}.`) ? whole.slice(under.length + 1) : whole;
  const found = form.get(named?.[inside] ?? inside) ?? form.get(whole);
  return found instanceof FormControl ? found : null;
}
