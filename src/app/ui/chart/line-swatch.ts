import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { LineStyle } from './chart-series';

/** A piece of a line as the chart draws it, for legends and rows. */
@Component({
  selector: 'app-line-swatch',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg viewBox="0 0 36 14" width="36" height="14" [style.color]="'var(' + style().token + ')'">
      <path
        d="M0 7h36"
        stroke="currentColor"
        [attr.stroke-width]="style().width"
        [attr.stroke-dasharray]="style().dash.join(' ') || null"
      />
      @switch (style().marker) {
        @case ('circle') {
          <circle cx="18" cy="7" r="4" fill="currentColor" />
        }
        @case ('triangle') {
          <path d="M18 2l5 9h-10z" fill="currentColor" />
        }
        @case ('rect') {
          <path d="M14 3h8v8h-8z" fill="currentColor" />
        }
        @case ('rectRot') {
          <path d="M18 2l5 5-5 5-5-5z" fill="currentColor" />
        }
      }
    </svg>
  `,
  styles: `
    :host {
      display: inline-block;
      line-height: 0;
    }
  `,
})
export class LineSwatch {
  readonly style = input.required<LineStyle>();
}
