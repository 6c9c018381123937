import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { Loom, LoomVersion } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { longMoment } from '../common/moments';
import { QUANTITIES, textOf } from '../common/quantity';
import { SetUpStore } from '../common/set-up-store';
import { CLOCK_KIND_WORDS } from './loom-facts';

/** The facts of a loom as they were, are and will be, the newest first. */
@Component({
  selector: 'app-facts-history',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h3>What held when</h3>
    <ol>
      @for (version of versions(); track version.id) {
        <li>
          <span class="when">{{ version.when }}</span>
          <span>{{ version.words }}</span>
          @if (version.flag) {
            <span class="flag" [class.good]="version.flag === 'now'">{{ version.flag }}</span>
          }
        </li>
      }
    </ol>
  `,
  styles: `
    :host {
      display: grid;
      gap: 6px;
    }
    ol {
      display: grid;
      gap: 6px;
      margin: 0;
      padding: 0;
      list-style: none;
    }
    li {
      display: flex;
      flex-wrap: wrap;
      gap: 2px 12px;
      padding: 8px 0;
      border-top: 1px solid var(--line);
    }
    .when {
      min-width: 15ch;
      font-weight: 600;
    }
  `,
})
export class FactsHistory {
  readonly loom = input.required<Loom>();
  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);

  protected readonly versions = computed(() => {
    const now = this.clock.tick();
    const loom = this.loom();
    const own = this.store
      .known()
      .loomVersions.filter((one) => one.loomId === loom.id)
      .sort((a, b) => b.effectiveAt - a.effectiveAt);
    const inForce = own.find((one) => one.effectiveAt <= now);
    return own.map((one, i) => ({
      id: one.id,
      when: i === own.length - 1 ? 'From the beginning' : longMoment(one.effectiveAt, this.store.timeZone()),
      words: this.wordsOf(one),
      flag: one.effectiveAt > now ? 'to come' : one.id === inForce?.id ? 'now' : '',
    }));
  });

  private wordsOf({ ppm, reedSpaceCm, clock, shuttles, battery }: LoomVersion): string {
    const width = QUANTITIES.width[this.store.units()];
    return [
      `${ppm} picks/min`,
      `${textOf(reedSpaceCm, width)} ${width.unit} reed space`,
      `clock: ${CLOCK_KIND_WORDS[clock.kind].toLowerCase()}, steps of ${clock.unit.toLocaleString('en-GB')}, ${clock.digits} digits`,
      shuttles === 1 ? '1 shuttle' : `${shuttles} shuttles`,
      battery ? 'battery' : 'no battery',
    ].join(' · ');
  }
}
