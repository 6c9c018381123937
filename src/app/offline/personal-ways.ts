import { Injectable, computed, inject } from '@angular/core';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import { OfflineParts } from './offline-parts';
import { PersonalFacts } from './personal-facts';

/** How a weaver logs perns: counted at hand-over, loom by loom or for the set, or a tap each. */
export type PernWay = 'each-loom' | 'whole-set' | 'taps';

/** How whoever is here likes to work on this device. */
@Injectable({ providedIn: 'root' })
export class PersonalWays {
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly ways = new PersonalFacts<PernWay>(
    inject(OfflineParts).database,
    'ways',
    computed(() => this.session.person()?.id ?? null),
    () => this.clock.now(),
  );

  readonly ready = this.ways.ready;
  readonly perns = computed<PernWay>(() => this.ways.of('perns') ?? 'each-loom');

  countPerns(way: PernWay): void {
    this.ways.keep('perns', way);
  }
}
