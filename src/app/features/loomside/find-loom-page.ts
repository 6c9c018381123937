import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  type ElementRef,
  computed,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import { OfflineBook } from '../../offline/offline-book';
import { ErrorState } from '../../ui/error-state';
import { NumberKeys } from '../../ui/number-keys';
import { padKeyOf } from '../../ui/pad-key';
import { readLabel, readsLabels } from './label-reader';

const DIGITS = 6;
const NO_CAMERA =
  'The camera could not be used: this browser was not let, or another program has it. Type the number that is painted on the loom.';

/** Opens a loom by the number painted on it, or by its label where the browser can read one. */
@Component({
  selector: 'app-find-loom-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ErrorState, MatButton, MatIcon, NumberKeys, RouterLink],
  host: { class: 'narrow', '(document:keydown)': 'takeKey($event)' },
  template: `
    <a matButton="outlined" class="back" routerLink="/loomside">Back to my looms</a>
    <h1>Find a loom</h1>
    @if (failure()) {
      <app-error-state [words]="failure()" />
    }
    @if (reading()) {
      <video #video muted playsinline aria-label="What the camera sees"></video>
      <button matButton="outlined" type="button" class="go" (click)="stop()">Type the number instead</button>
    } @else {
      <div class="number" role="status" aria-label="Loom number">
        <span class="muted">Loom number</span>
        <span class="num">{{ number() }}</span>
      </div>
      <app-number-keys
        [ready]="number() !== ''"
        doneLabel="Open the loom"
        (digitPressed)="add($event)"
        (erased)="erase()"
        (finished)="open()"
      />
      @if (readsLabels) {
        <button matButton="outlined" type="button" class="go" (click)="read()">
          <mat-icon svgIcon="label" aria-hidden="true" />
          Read its label
        </button>
      } @else {
        <p class="small muted">
          This browser cannot read labels by itself. The tablet’s own camera can: point it at the label and
          open the link.
        </p>
      }
    }
  `,
  styles: `
    .number {
      display: flex;
      align-items: baseline;
      justify-content: space-between;
      min-height: var(--touch-primary);
      padding: 8px 14px;
      border: 2px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--raised);
    }
    .number .num {
      font-size: 2.125rem;
      font-weight: 600;
    }
    video {
      width: 100%;
      aspect-ratio: 1;
      object-fit: cover;
      border-radius: var(--r);
      background: var(--sunk);
    }
  `,
  styleUrl: './pass.scss',
})
export class FindLoomPage {
  private readonly book = inject(OfflineBook);
  private readonly router = inject(Router);
  private readonly video = viewChild<ElementRef<HTMLVideoElement>>('video');

  protected readonly readsLabels = readsLabels();
  protected readonly number = signal('');
  protected readonly reading = signal(false);
  protected readonly failure = signal('');
  private readonly known = computed(() => new Set(this.book.looms().map((loom) => String(loom.number))));
  private aborting = new AbortController();

  constructor() {
    inject(DestroyRef).onDestroy(() => this.aborting.abort());
  }

  protected add(digit: string): void {
    this.failure.set('');
    if (this.number().length < DIGITS) this.number.set((this.number() + digit).replace(/^0+/, ''));
  }

  protected erase(): void {
    this.number.set(this.number().slice(0, -1));
  }

  protected async open(): Promise<void> {
    const number = this.number();
    if (number === '') return;
    if (!this.known().has(number)) {
      this.failure.set(
        `There is no loom ${number} in this shed, as far as this device knows. Look again at the number.`,
      );
      return;
    }
    await this.router.navigate(['/loomside/loom', number]);
  }

  protected async read(): Promise<void> {
    this.failure.set('');
    this.aborting = new AbortController();
    const { signal } = this.aborting;
    this.reading.set(true);
    // The picture stands in the page only now.
    await new Promise((resolve) => requestAnimationFrame(resolve));
    const video = this.video()?.nativeElement;
    try {
      const number = video ? await readLabel(video, signal) : null;
      this.reading.set(false);
      if (number === null) return;
      this.number.set(String(number));
      await this.open();
    } catch {
      this.reading.set(false);
      this.failure.set(NO_CAMERA);
    }
  }

  protected stop(): void {
    this.aborting.abort();
    this.reading.set(false);
  }

  /** The keys of a keyboard, where there is one. */
  protected takeKey(event: KeyboardEvent): void {
    // What is typed into the lock, or a header's panel, is not meant for this page.
    const inDialog = event.target instanceof Element && event.target.closest('dialog') !== null;
    const pressed = this.reading() || inDialog ? null : padKeyOf(event);
    if (!pressed) return;
    event.preventDefault();
    if (pressed.key === 'digit') this.add(pressed.digit);
    else if (pressed.key === 'erase') this.erase();
    else void this.open();
  }
}
