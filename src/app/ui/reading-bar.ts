import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The book on this device is being read: the browser's own bar, since a library's would wait for its download. */
@Component({
  selector: 'app-reading-bar',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `<progress aria-label="Reading the book on this device"></progress>`,
  styles: `
    :host {
      display: block;
    }

    progress {
      display: block;
      width: 100%;
      height: 4px;
      accent-color: var(--flax);
    }
  `,
})
export class ReadingBar {}
