import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { MarkKind } from './mark-kind';

/** A swatch of a cause's mark, for legends, lists and choices. Says nothing to a screen reader: words stand beside it. */
@Component({
  selector: 'app-cause-mark',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg viewBox="0 0 30 16" width="30" height="16">
      <rect x=".5" y=".5" width="29" height="15" class="ground" [class.planned]="mark() === 'planned'" />
      <path [attr.d]="path()" [attr.class]="mark()" />
    </svg>
  `,
  styles: `
    :host {
      display: inline-block;
      line-height: 0;
    }
    .ground {
      fill: var(--gap);
      stroke: var(--line-strong);
    }
    .ground.planned {
      fill: var(--sunk);
    }
    path {
      fill: none;
      stroke: var(--ink);
      stroke-width: 1.8;
    }
    .warp {
      stroke: var(--madder);
    }
    .weft {
      stroke: var(--weld);
    }
    .tackler {
      stroke-width: 2.4;
    }
    .pern {
      fill: var(--ink-2);
      stroke: none;
    }
    .care {
      stroke-linecap: round;
      stroke-width: 2.6;
      stroke: var(--ink-2);
    }
    .waiting {
      stroke: var(--ink-2);
    }
    .woven {
      stroke: var(--weave-a);
      stroke-dasharray: 2.4 1;
      stroke-width: 2.4;
    }
  `,
})
export class CauseMark {
  readonly mark = input.required<MarkKind | 'woven'>();

  protected readonly path = computed(() => PATHS[this.mark()]);
}

const PATHS: Readonly<Record<MarkKind | 'woven', string>> = {
  warp: 'M4 1v14M8 1v14M12 1v14M16 1v14M20 1v14M24 1v14M28 1v14',
  weft: 'M1 4h28M1 8h28M1 12h28',
  pern: 'M5 3l3 5-3 5-3-5zM12 3l3 5-3 5-3-5zM19 3l3 5-3 5-3-5zM26 3l3 5-3 5-3-5z',
  tackler: 'M1 11L11 1M1 15.500L15.500 1M6 15L20 1M12 15L26 1M18 15L29 4M24 15L29 10',
  waiting: 'M3 3h24v10H3z',
  care: 'M5 5h.01M11 5h.01M17 5h.01M23 5h.01M8 11h.01M14 11h.01M20 11h.01M26 11h.01',
  planned: '',
  woven: 'M1 3h28M2.500 6.500h26.500M1 10h28M2.500 13.500h26.500',
};
