import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Clock } from '../core/clock';
import { dateOf, formatMoment } from '../core/dates';
import { SessionStore } from '../core/session-store';
import { sentenceOf } from '@shared/contract/errors';
import { OfflineBook } from '../offline/offline-book';
import { PhotoBook } from '../offline/photo-book';
import type { OutboxItem } from '../offline/outbox-items';
import { BringInFile } from './bring-in-file';
import { photoWords } from './sync-words';

/** Long queues are counted, not drawn: a day without network can be hundreds of taps. */
const SHOWN = 100;

const GROUPS: readonly { readonly state: OutboxItem['state']; readonly heading: string }[] = [
  { state: 'refused', heading: 'Not taken by the book' },
  { state: 'held', heading: 'Held for the foreman' },
  { state: 'later', heading: 'For a newer server' },
  { state: 'waiting', heading: 'Waiting to be sent' },
];

/** What is not simply in the book: each entry with its sentence; try again, export, put away what was refused. */
@Component({
  selector: 'app-sync-panel',
  imports: [BringInFile, MatButton, MatIcon],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './sync-panel.html',
  styleUrl: './sync-panel.scss',
})
export class SyncPanel {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly pictures = inject(PhotoBook);

  protected readonly state = this.book.syncState;
  protected readonly said = signal('');
  protected readonly mayBringIn = computed(() => this.session.may('entries.bring-in'));
  protected readonly groups = computed(() => {
    const items = this.book.items();
    const now = this.clock.tick();
    return GROUPS.map(({ state, heading }) => {
      const ofState = items.filter((item) => item.state === state);
      return {
        state,
        heading,
        count: ofState.length,
        more: Math.max(0, ofState.length - SHOWN),
        items: ofState.slice(0, SHOWN).map((item) => ({ ...item, when: formatMoment(item.at, now) })),
      };
    }).filter((group) => group.count > 0);
  });
  /** Refused photos that lie in a file of their own by now. */
  private readonly savedPhotos = signal<ReadonlySet<string>>(new Set());
  /** Photos that wait, and those that the server will not have. */
  protected readonly photos = computed(() => {
    const { waiting, refused } = this.book.photos();
    return {
      waiting: waiting > 0 ? photoWords(waiting) : '',
      refused: refused.map(({ id, code }) => ({
        id,
        why: sentenceOf(code),
        saved: this.savedPhotos().has(id),
      })),
    };
  });
  protected readonly lastReached = computed(() => {
    const at = this.state().lastReachedAt;
    const now = this.clock.tick();
    return at === null ? '' : formatMoment(Math.min(at, now), now);
  });
  protected readonly nextTry = computed(() => {
    const at = this.state().nextTryAt;
    return at === null || at <= this.clock.tick() ? '' : formatMoment(at, this.clock.tick());
  });

  protected retryNow(): void {
    this.said.set('Trying now …');
    this.book.retryNow();
  }

  protected async exportToFile(): Promise<void> {
    try {
      save(await this.book.exportWaiting(), `shedbeat-${dateOf(this.clock.now())}-not-in-the-book.json`);
      this.said.set('Exported. The file holds every entry listed here; they stay on this device too.');
    } catch {
      this.said.set('The file could not be written. Nothing is lost: the entries stay on this device.');
    }
  }

  protected async putAway(item: OutboxItem): Promise<void> {
    const gone = await this.book.dismissRefused(item.id);
    this.said.set(gone ? `Put away: ${item.what}.` : 'Export it to a file first; then it can be put away.');
  }

  protected async savePhoto(id: string): Promise<void> {
    const picture = await this.pictures.waitingBlob(id);
    if (!picture) {
      this.said.set('This photo could not be read on this device. Nothing was put away.');
      return;
    }
    save(picture, `shedbeat-photo-${id}.${picture.type === 'image/webp' ? 'webp' : 'jpg'}`);
    this.savedPhotos.update((ids) => new Set(ids).add(id));
    this.said.set('Saved as a file. The photo stays on this device too, until it is put away.');
  }

  protected async putPhotoAway(id: string): Promise<void> {
    try {
      await this.pictures.drop(id);
      this.said.set('Photo put away.');
    } catch {
      this.said.set('The photo could not be put away: it stays on this device.');
    }
  }
}

/** Hands a file to the browser's downloads. */
function save(file: Blob, name: string): void {
  const url = URL.createObjectURL(file);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The download has its own hold of the file by the next turn.
  setTimeout(() => URL.revokeObjectURL(url), 0);
}
