import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import { BringIn } from '../offline/bring-in';
import { OfflineBook } from '../offline/offline-book';
import type { OutboxItem } from '../offline/outbox-items';
import { PhotoBook } from '../offline/photo-book';
import { NO_PHOTOS, type PhotosWaiting } from '../offline/photos-waiting';
import type { SyncState } from '../offline/sync-state';
import { provideIcons } from '../ui/icons';
import { SyncBadge } from './sync-badge';
import { SyncPanel } from './sync-panel';

const NOW = new Date(2026, 4, 12, 10, 30).getTime();

function item(over: Partial<OutboxItem>): OutboxItem {
  return {
    id: 'entry-1',
    state: 'waiting',
    what: 'Loom 7: warp break',
    why: 'Saved on this device.',
    at: NOW - 60_000,
    dismissible: false,
    exported: false,
    ...over,
  };
}

/** Stands for the book of this device: what the header shows of it. */
class HeaderBook {
  readonly items = signal<readonly OutboxItem[]>([]);
  readonly syncState = signal<SyncState>({
    kind: 'in-book',
    waiting: 0,
    needsLook: 0,
    photos: 0,
    lastReachedAt: NOW,
    nextTryAt: null,
    online: true,
    code: null,
    sentence: null,
  });
  readonly photos = signal<PhotosWaiting>(NO_PHOTOS);
  readonly may = new Set<string>();
  tries = 0;
  readonly dismissed: string[] = [];
  retryNow(): void {
    this.tries++;
  }
  dismissRefused(id: string): Promise<boolean> {
    this.dismissed.push(id);
    return Promise.resolve(true);
  }
  exportWaiting(): Promise<Blob> {
    return Promise.reject(new Error('disk full'));
  }
}

/** Stands for the pictures on this device's disk. */
class DevicePhotos {
  readonly dropped: string[] = [];
  waitingBlob(id: string): Promise<Blob | null> {
    return Promise.resolve(id === 'gone' ? null : new Blob(['picture'], { type: 'image/jpeg' }));
  }
  drop(id: string): Promise<void> {
    this.dropped.push(id);
    return Promise.resolve();
  }
}

function bed() {
  const book = new HeaderBook();
  TestBed.configureTestingModule({
    providers: [
      provideIcons(),
      { provide: OfflineBook, useValue: book },
      { provide: PhotoBook, useValue: new DevicePhotos() },
      { provide: SessionStore, useValue: { may: (permission: string) => book.may.has(permission) } },
      { provide: Clock, useValue: { tick: signal(NOW), now: () => NOW } },
    ],
  });
  return book;
}

const textOf = (root: HTMLElement) => (root.textContent ?? '').replace(/\s+/g, ' ').trim();

describe('SyncBadge', () => {
  it('follows the book and opens the list', () => {
    const book = bed();
    const fixture = TestBed.createComponent(SyncBadge);
    let opened = 0;
    fixture.componentInstance.opened.subscribe(() => opened++);
    fixture.detectChanges();
    expect(textOf(fixture.nativeElement)).toBe('In the book, 10:30');
    book.syncState.update((state) => ({ ...state, kind: 'offline', waiting: 7, online: false }));
    fixture.detectChanges();
    expect(textOf(fixture.nativeElement)).toContain('7 waiting, book last reached 10:30');
    expect(fixture.nativeElement.querySelector('[role=status]').textContent).toContain(
      'saved on this device',
    );
    fixture.nativeElement.querySelector('button').click();
    expect(opened).toBe(1);
  });
});

describe('SyncPanel', () => {
  it('lists what is refused, held, from later and waiting, each with its sentence', () => {
    const book = bed();
    book.items.set([
      item({ id: 'a' }),
      item({ id: 'b', state: 'held', what: 'Loom 8: reading', why: 'The foreman decides.' }),
      item({ id: 'c', state: 'refused', what: 'Loom 9: smash', why: 'The book has no such loom.' }),
      item({ id: 'd', state: 'later', what: 'Loom 1: note', why: 'The server is older.' }),
    ]);
    const fixture = TestBed.createComponent(SyncPanel);
    fixture.detectChanges();
    const root: HTMLElement = fixture.nativeElement;
    expect([...root.querySelectorAll('h3')].map(textOf)).toEqual([
      'Not taken by the book 1',
      'Held for the foreman 1',
      'For a newer server 1',
      'Waiting to be sent 1',
    ]);
    expect(textOf(root.querySelector('li b')?.parentElement ?? root)).toMatch(/^Loom 9: smash \S/);
    for (const sentence of ['The foreman decides.', 'The book has no such loom.', 'The server is older.'])
      expect(textOf(root)).toContain(sentence);
  });

  it('puts away a refused entry only once it was exported', async () => {
    const book = bed();
    book.items.set([item({ state: 'refused' })]);
    const fixture = TestBed.createComponent(SyncPanel);
    fixture.detectChanges();
    const button = () => fixture.nativeElement.querySelector('li button') as HTMLButtonElement;
    expect(button().disabled).toBe(true);
    book.items.set([item({ state: 'refused', exported: true, dismissible: true })]);
    fixture.detectChanges();
    button().click();
    await vi.waitFor(() => expect(book.dismissed).toEqual(['entry-1']));
  });

  it('puts away a refused photo only once it lies in a file', async () => {
    const book = bed();
    const pictures = TestBed.inject(PhotoBook) as unknown as DevicePhotos;
    const create = vi.spyOn(URL, 'createObjectURL').mockReturnValue('blob:picture');
    vi.spyOn(URL, 'revokeObjectURL').mockReturnValue();
    vi.spyOn(HTMLAnchorElement.prototype, 'click').mockReturnValue();
    book.photos.set({
      waiting: 0,
      refused: [
        { id: 'gone', code: 'photo-too-large' },
        { id: 'photo-2', code: 'photo-no-repair' },
      ],
    });
    const fixture = TestBed.createComponent(SyncPanel);
    const root: HTMLElement = fixture.nativeElement;
    const button = (label: string) => root.querySelector<HTMLButtonElement>(`[aria-label="${label}"]`);
    fixture.detectChanges();
    expect(button('Put photo 2 away')?.disabled).toBe(true);

    button('Save photo 1 as a file')?.click();
    await vi.waitFor(() => {
      fixture.detectChanges();
      expect(textOf(root)).toContain('This photo could not be read on this device.');
    });
    expect(button('Put photo 1 away')?.disabled).toBe(true);

    button('Save photo 2 as a file')?.click();
    await vi.waitFor(() => {
      fixture.detectChanges();
      expect(button('Put photo 2 away')?.disabled).toBe(false);
    });
    expect(create).toHaveBeenCalledTimes(1);
    button('Put photo 2 away')?.click();
    await vi.waitFor(() => expect(pictures.dropped).toEqual(['photo-2']));
    vi.restoreAllMocks();
  });

  it('tries again when asked, and says that nothing is lost when the file cannot be written', async () => {
    const book = bed();
    book.items.set([item({})]);
    const fixture = TestBed.createComponent(SyncPanel);
    fixture.detectChanges();
    const [retry, toFile] = fixture.nativeElement.querySelectorAll(
      '.acts button',
    ) as NodeListOf<HTMLButtonElement>;
    retry?.click();
    expect(book.tries).toBe(1);
    toFile?.click();
    await vi.waitFor(() => {
      fixture.detectChanges();
      expect(textOf(fixture.nativeElement)).toContain('Nothing is lost: the entries stay on this device.');
    });
  });

  it('offers to bring in a file to whoever may, and says what became of it', async () => {
    const book = bed();
    const brought = { inBook: 2, others: [{ why: 'The book has no such loom.', count: 1 }], stopped: null };
    TestBed.overrideProvider(BringIn, { useValue: { file: () => Promise.resolve(brought) } });
    const without = TestBed.createComponent(SyncPanel);
    without.detectChanges();
    expect(without.nativeElement.querySelector('app-bring-in-file')).toBeNull();
    book.may.add('entries.bring-in');
    const fixture = TestBed.createComponent(SyncPanel);
    fixture.detectChanges();
    const root: HTMLElement = fixture.nativeElement;
    const input = root.querySelector<HTMLInputElement>('input[type=file]');
    Object.defineProperty(input, 'files', { value: [new File(['{}'], 'waiting.json')] });
    input?.dispatchEvent(new Event('change'));
    await vi.waitFor(() => {
      fixture.detectChanges();
      expect(textOf(root)).toMatch(/2 entries are in the book\. ?1 The book has no such loom\./);
    });
  });
});
