import {
  DestroyRef,
  Injectable,
  computed,
  effect,
  inject,
  linkedSignal,
  signal,
  untracked,
} from '@angular/core';
import { OfflineBook } from '../../offline/offline-book';
import { CallSound } from './call-sound';
import { CallsStore, type CallRow } from './calls-store';

/** How often an untaken call is told of again, ms. */
export const REPEAT = 20_000;
const PATTERN = [400, 150, 400, 150, 700];

interface BadgeNavigator {
  setAppBadge?: (count: number) => Promise<void>;
  clearAppBadge?: () => Promise<void>;
}

/**
 * Tells of calls that nobody has taken: vibration, sound, a flash over the whole page, the number on the
 * application's icon; again and again until somebody takes them. It needs no internet, only the open page. Provided by
 * the frame of the tackler's screens.
 */
@Injectable()
export class CallAlarm {
  private readonly store = inject(CallsStore);
  private readonly sound = inject(CallSound);
  private readonly book = inject(OfflineBook);
  /** Calls whose flash was put away; they are told of by sound and vibration still, and stay on the list. */
  private readonly putAway = signal<ReadonlySet<string>>(new Set());
  private readonly ids = computed(() => this.store.waiting().map(({ id }) => id), {
    equal: (a, b) => a.length === b.length && a.every((id, i) => id === b[i]),
  });

  /** The call that flashes: whichever waits longest and was not put away. */
  readonly flashing = computed<CallRow | null>(
    () => this.store.waiting().find(({ id }) => !this.putAway().has(id)) ?? null,
  );
  /** Counts up at each telling, so that the flash is seen to begin anew. */
  readonly told = linkedSignal<readonly string[], number>({
    source: this.ids,
    computation: (_ids, before) => (before?.value ?? 0) + 1,
  });

  constructor() {
    // Whoever opens the list sees what waits: only what comes while it is open flashes.
    let known: ReadonlySet<string> | null = null;
    let timer: ReturnType<typeof setInterval> | undefined;
    effect(() => {
      const ids = this.ids();
      if (!this.book.ready() || this.store.catchingUp()) return;
      untracked(() => {
        badge(ids.length);
        if (known === null) this.putAway.set(new Set(ids));
        else if (ids.some((id) => known?.has(id) === false)) this.tell();
        known = new Set(ids);
        clearInterval(timer);
        if (ids.length > 0) timer = setInterval(() => this.tellAgain(), REPEAT);
      });
    });
    inject(DestroyRef).onDestroy(() => {
      clearInterval(timer);
      badge(0);
    });
  }

  /** Takes the flash away: what waits stays on the list, and is told of again by sound and vibration. */
  putFlashAway(): void {
    this.putAway.update((ids) => new Set([...ids, ...this.ids()]));
  }

  private tellAgain(): void {
    this.told.update((n) => n + 1);
    this.tell();
  }

  private tell(): void {
    navigator.vibrate?.(PATTERN);
    this.sound.ring();
  }
}

function badge(count: number): void {
  const { setAppBadge, clearAppBadge } = navigator as BadgeNavigator;
  const done = count > 0 ? setAppBadge?.call(navigator, count) : clearAppBadge?.call(navigator);
  done?.catch(() => undefined);
}
