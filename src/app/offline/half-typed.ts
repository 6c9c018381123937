import { Injectable, computed, inject } from '@angular/core';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import { OfflineParts } from './offline-parts';
import { PersonalFacts } from './personal-facts';

const A_DAY = 86_400_000;

/**
 * What somebody had half typed when the tablet locked, another took it, or the page went: theirs alone, and there
 * again when they are. A day old, it is forgotten.
 */
@Injectable({ providedIn: 'root' })
export class HalfTyped {
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly texts = new PersonalFacts<string>(
    inject(OfflineParts).database,
    'half-typed',
    computed(() => this.session.person()?.id ?? null),
    () => this.clock.now(),
    A_DAY,
  );

  readonly ready = this.texts.ready;

  /** Empty: nothing. */
  of(what: string): string {
    return this.texts.of(what) ?? '';
  }

  keep(what: string, text: string): void {
    if (text !== this.of(what)) this.texts.keep(what, text === '' ? null : text);
  }
}
