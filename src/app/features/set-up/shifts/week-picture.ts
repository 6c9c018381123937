import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { formatMinutes } from '@shared/figures/format';
import { WEEKDAYS } from './pattern-words';
import { uncoveredMinutes, type Ribbon } from './week-ribbons';

/** A shed's week as ribbons, one a pattern: where it is woven, where the looms stand for a meal, where nobody is there. */
@Component({
  selector: 'app-week-picture',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div class="days" aria-hidden="true">
      @for (day of days; track day) {
        <span>{{ day }}</span>
      }
    </div>
    @for (ribbon of ribbons(); track ribbon.id) {
      <div class="name" aria-hidden="true">{{ ribbon.name }}</div>
      <div class="bar" aria-hidden="true">
        @for (piece of ribbon.pieces; track $index) {
          <i [class]="piece.kind" [style.left.%]="piece.left * 100" [style.width.%]="piece.width * 100"></i>
        }
      </div>
    }
    <p class="small muted open">{{ openWords() }}</p>
  `,
  styles: `
    :host {
      display: grid;
      grid-template-columns: minmax(64px, auto) minmax(0, 1fr);
      gap: 6px 12px;
      align-items: center;
      padding: var(--gap-2);
      background: var(--surface);
      border: 1px solid var(--line);
      border-radius: var(--r);
    }
    .days {
      display: grid;
      grid-template-columns: repeat(7, minmax(0, 1fr));
      grid-column: 2;
      font-size: 0.875rem;
      color: var(--ink-2);
    }
    .days span {
      padding-left: 3px;
      border-left: 1px solid var(--line-strong);
      overflow: hidden;
    }
    .name {
      font-weight: 600;
      overflow-wrap: anywhere;
      max-width: 140px;
    }
    .bar {
      position: relative;
      height: 26px;
      overflow: hidden;
      background:
        repeating-linear-gradient(to right, var(--line-strong) 0 1px, transparent 1px calc(100% / 7)),
        var(--rest);
    }
    i {
      position: absolute;
      top: 3px;
      bottom: 3px;
    }
    .shift {
      background: repeating-linear-gradient(to bottom, var(--weave-a) 0 3px, var(--weave-b) 3px 5px);
    }
    .meal-stopped {
      background: var(--gap);
    }
    .meal-running {
      top: auto;
      height: 7px;
      border-top: 2px solid var(--gap);
      background: var(--ink);
    }
    .open {
      grid-column: 1 / -1;
    }
    @media (max-width: 600px) {
      :host {
        grid-template-columns: minmax(0, 1fr);
      }
      .days {
        grid-column: 1;
      }
      .name {
        max-width: none;
        margin-bottom: -4px;
      }
    }
  `,
})
export class WeekPicture {
  readonly ribbons = input.required<readonly Ribbon[]>();

  protected readonly days = WEEKDAYS;
  protected readonly openWords = computed(() => {
    const open = uncoveredMinutes(this.ribbons());
    const eats = (looms: 'stopped' | 'running') =>
      this.ribbons().some(({ facts }) => facts.meal?.looms === looms);
    const [stopped, running] = [eats('stopped'), eats('running')];
    return [
      open === 0
        ? 'Every hour of the week is in a shift.'
        : `${formatMinutes(open)} of the week are in no shift.`,
      stopped ? 'A gap in a ribbon is a meal at which the looms stand.' : '',
      running ? 'A bar across its foot is a meal at which they run.' : '',
    ]
      .filter(Boolean)
      .join(' ');
  });
}
