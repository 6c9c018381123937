import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The book on this device is being read: the browser's own bar, since a library's would wait for its download. */
@Component({
  selector: 'app-reading-bar',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `<progress aria-label="Reading the book"></progress>`,
  styles: `
    progress {
      width: 100%;
    }
  `,
})
export class ReadingBar {}
