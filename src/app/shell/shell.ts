import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterOutlet } from '@angular/router';

@Component({
  selector: 'app-shell',
  imports: [RouterOutlet],
  template: '<main id="main" tabindex="-1"><router-outlet /></main>',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Shell {}
