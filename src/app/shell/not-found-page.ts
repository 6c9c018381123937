import { ChangeDetectionStrategy, Component } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { EmptyState } from '../ui/empty-state';

@Component({
  selector: 'app-not-found-page',
  imports: [EmptyState, MatButton, RouterLink],
  host: { class: 'page' },
  template: `
    <h1>There is no such page</h1>
    <app-empty-state
      heading="This address leads nowhere"
      words="It may have been typed wrongly, or it belongs to another version. Nothing you logged is touched by that."
    >
      <a matButton="filled" routerLink="/">Back to your work</a>
    </app-empty-state>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFoundPage {}
