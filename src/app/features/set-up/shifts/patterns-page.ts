import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { Clock } from '../../../core/clock';
import { dateOf } from '../../../core/dates';
import { EmptyState } from '../../../ui/empty-state';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { patternSentence, spanWords } from './pattern-words';
import { WeekPicture } from './week-picture';
import { inForceOn, weekRibbons } from './week-ribbons';

/** Each shed's shift patterns: its week as ribbons, and each pattern in words. */
@Component({
  selector: 'app-patterns-page',
  imports: [EmptyState, MatButton, MatIcon, RoomHeading, RouterLink, WeekPicture],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      heading="Shift patterns"
      words="Shifts are made from them five weeks ahead, each with its real length, also on the nights when the clocks change."
    />
    @if (saved()) {
      <p class="flag good said" role="status">{{ saved() }} is saved.</p>
    }
    @for (shed of sheds(); track shed.id) {
      <section [attr.aria-label]="shed.name">
        <header>
          <h2>{{ shed.name }}</h2>
          <a matButton="filled" routerLink="new" [queryParams]="{ shed: shed.id }">
            <mat-icon svgIcon="add" aria-hidden="true" /> Add a pattern
          </a>
        </header>
        @if (shed.ribbons.length > 0) {
          <app-week-picture [ribbons]="shed.ribbons" />
        }
        @if (shed.patterns.length > 0) {
          <ul>
            @for (pattern of shed.patterns; track pattern.id) {
              <li class="card" [class.past]="pattern.state === 'ended'">
                <a [routerLink]="pattern.id">{{ pattern.name }}</a>
                @if (pattern.state) {
                  <span class="flag" [class.look]="pattern.state === 'to come'">{{ pattern.state }}</span>
                }
                <p>{{ pattern.sentence }}</p>
                <p class="small muted span">{{ pattern.span }}</p>
              </li>
            }
          </ul>
        } @else {
          <app-empty-state
            heading="No shift yet"
            words="Nothing can be logged before the shed has a shift. Add the first: its hours, its days, its meal."
          />
        }
      </section>
    } @empty {
      <app-empty-state heading="No shed yet" words="Shifts are of a shed. Add the shed and its looms first.">
        <a matButton="filled" routerLink="/set-up/looms">To sheds and looms</a>
      </app-empty-state>
    }
  `,
  styleUrls: ['../common/room.scss', './patterns-page.scss'],
})
export class PatternsPage {
  /** From the address: the pattern that was saved last. */
  readonly at = input<string>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);

  private readonly today = computed(() => dateOf(this.clock.tick(), this.store.timeZone()));
  protected readonly sheds = computed(() => {
    const { sheds, patterns } = this.store.known();
    const today = this.today();
    return sheds.map(({ id, name }) => ({
      id,
      name,
      ribbons: weekRibbons(patterns, id, today),
      patterns: patterns
        .filter(({ shedId }) => shedId === id)
        .map((pattern) => ({
          id: pattern.id,
          name: pattern.name,
          sentence: patternSentence(pattern),
          span: spanWords(pattern),
          state: inForceOn(pattern, today)
            ? ''
            : pattern.until !== null && pattern.until <= today
              ? 'ended'
              : 'to come',
          starts: pattern.startsLocal,
        }))
        .sort((a, b) => order(a.state) - order(b.state) || a.starts.localeCompare(b.starts)),
    }));
  });
  protected readonly saved = computed(
    () => this.store.known().patterns.find(({ id }) => id === this.at())?.name ?? '',
  );
}

function order(state: string): number {
  return ['', 'to come', 'ended'].indexOf(state);
}
