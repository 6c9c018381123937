import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  effect,
  inject,
  input,
  model,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { LIMITS } from '@shared/contract/limits';
import { NotSaved } from '../../offline/not-saved';
import { PhotoBook } from '../../offline/photo-book';
import { shrinkPhoto } from './photo-shrink';

interface Shown {
  readonly id: string;
  readonly url: string;
}

/** Photos of what is being written: each lies on this device's disk before it is shown here. */
@Component({
  selector: 'app-photo-taker',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, MatIcon],
  template: `
    @if (shown().length) {
      <ul>
        @for (photo of shown(); track photo.id; let place = $index) {
          <li>
            <img [src]="photo.url" [alt]="'Photo ' + (place + 1)" />
            <button
              matButton="outlined"
              type="button"
              [attr.aria-label]="'Drop photo ' + (place + 1)"
              (click)="drop(photo.id)"
            >
              <mat-icon svgIcon="close" aria-hidden="true" /> Drop
            </button>
          </li>
        }
      </ul>
    }
    @if (room() > 0) {
      <label class="take" [class.busy]="busy()">
        <mat-icon svgIcon="add" aria-hidden="true" />
        <span>{{ busy() ? 'Making it smaller …' : shown().length ? 'Another photo' : 'Take a photo' }}</span>
        <span class="muted small">up to {{ most }}, kept here until they are sent</span>
        <input
          type="file"
          accept="image/*"
          capture="environment"
          class="visually-hidden"
          multiple
          [disabled]="busy()"
          (change)="take($event)"
        />
      </label>
    }
    @if (complaint()) {
      <p class="flag look" role="alert">{{ complaint() }}</p>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-1);
    }
    ul {
      display: grid;
      grid-template-columns: repeat(auto-fill, minmax(120px, 1fr));
      gap: var(--gap-1);
      margin: 0;
      padding: 0;
      list-style: none;
    }
    li {
      display: grid;
      gap: 4px;
    }
    img {
      width: 100%;
      aspect-ratio: 4 / 3;
      object-fit: cover;
      border: 1px solid var(--line);
      border-radius: var(--r);
    }
    li button {
      min-height: 48px;
    }
    .take {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: 4px 12px;
      min-height: 64px;
      padding: 8px 16px;
      border: 1px dashed var(--line-strong);
      border-radius: var(--r);
      font-weight: 600;
      cursor: pointer;
    }
    .take:focus-within {
      outline: 3px solid var(--flax);
      outline-offset: 2px;
    }
    .take .small {
      font-weight: 400;
    }
  `,
})
export class PhotoTaker {
  /** The entry that will name them. */
  readonly repairId = input.required<string>();
  readonly ids = model<readonly string[]>([]);

  private readonly photos = inject(PhotoBook);
  protected readonly most = LIMITS.photosPerRepair;
  protected readonly shown = signal<readonly Shown[]>([]);
  protected readonly busy = signal(false);
  protected readonly complaint = signal('');
  protected readonly room = computed(() => this.most - this.shown().length);

  constructor() {
    effect(() => {
      const repairId = this.repairId();
      untracked(() => void this.bringBack(repairId));
    });
    inject(DestroyRef).onDestroy(() => this.forget());
  }

  protected async take(event: Event): Promise<void> {
    const field = event.target;
    if (!(field instanceof HTMLInputElement)) return;
    const files = [...(field.files ?? [])];
    field.value = '';
    this.busy.set(true);
    this.complaint.set(
      files.length > this.room() ? `A repair has up to ${this.most} photos: the first ones are kept.` : '',
    );
    for (const file of files.slice(0, this.room())) await this.keep(file);
    this.busy.set(false);
  }

  protected async drop(id: string): Promise<void> {
    const photo = this.shown().find((one) => one.id === id);
    await this.photos.drop(id).catch(() => undefined);
    if (photo) URL.revokeObjectURL(photo.url);
    this.show(this.shown().filter((one) => one.id !== id));
  }

  private async keep(file: File): Promise<void> {
    let small: Blob;
    try {
      small = await shrinkPhoto(file);
    } catch {
      this.complaint.set(`${file.name} is not a picture that this browser can read. Nothing was kept of it.`);
      return;
    }
    try {
      const { id, blob } = await this.photos.keep(this.repairId(), small);
      this.show([...this.shown(), { id, url: URL.createObjectURL(blob) }]);
    } catch (error) {
      this.complaint.set(error instanceof NotSaved ? error.sentence : 'This photo could not be kept here.');
    }
  }

  /** After a reload: what was taken lies on this device still. */
  private async bringBack(repairId: string): Promise<void> {
    const held = await this.photos.heldOf(repairId);
    if (this.repairId() !== repairId) return;
    this.forget();
    this.show(held.map(({ id, blob }) => ({ id, url: URL.createObjectURL(blob) })));
  }

  private show(photos: readonly Shown[]): void {
    this.shown.set(photos);
    this.ids.set(photos.map(({ id }) => id));
  }

  private forget(): void {
    for (const { url } of this.shown()) URL.revokeObjectURL(url);
  }
}
