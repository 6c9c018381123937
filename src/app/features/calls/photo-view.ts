import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { PictureClient } from '../../core/picture-client';
import { PhotoBook } from '../../offline/photo-book';

/** A photo of a repair: from this device where it waits here, else from the server, fetched with the bearer. */
@Component({
  selector: 'app-photo-view',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (url()) {
      <a [href]="url()" target="_blank" [attr.aria-label]="label() + ', larger'">
        <img [src]="url()" [alt]="label()" />
      </a>
    } @else {
      <p class="muted small">{{ words() }}</p>
    }
  `,
  styles: `
    :host {
      display: grid;
      place-items: center;
      min-height: 90px;
      border: 1px solid var(--line);
      border-radius: var(--r);
      background: var(--sunk);
      overflow: hidden;
    }
    a,
    img {
      display: block;
      width: 100%;
    }
    img {
      aspect-ratio: 4 / 3;
      object-fit: cover;
    }
    p {
      padding: 8px;
      text-align: center;
    }
  `,
})
export class PhotoView {
  readonly photo = input.required<{ readonly id: string; readonly kept: boolean }>();
  readonly label = input('Photo');

  private readonly pictures = inject(PictureClient);
  private readonly photos = inject(PhotoBook);
  protected readonly url = signal('');
  protected readonly words = signal('Fetching the photo …');

  constructor() {
    effect((onCleanup) => {
      const { id, kept } = this.photo();
      let wanted = true;
      onCleanup(() => (wanted = false));
      untracked(() => {
        this.show('');
        void this.fetch(id, kept).then((blob) => {
          if (wanted && blob) this.show(URL.createObjectURL(blob));
        });
      });
    });
    inject(DestroyRef).onDestroy(() => this.show(''));
  }

  private async fetch(id: string, kept: boolean): Promise<Blob | null> {
    const here = await this.photos.waitingBlob(id);
    if (here) return here;
    if (!kept) {
      this.words.set('Not sent from its tablet yet');
      return null;
    }
    const blob = await this.pictures.get(`/api/photos/${id}`);
    if (!blob) this.words.set('The photo cannot be fetched now');
    return blob;
  }

  private show(url: string): void {
    if (this.url()) URL.revokeObjectURL(this.url());
    this.url.set(url);
  }
}
