import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { SessionStore } from '../core/session-store';
import { EmptyState } from '../ui/empty-state';

@Component({
  selector: 'app-not-permitted-page',
  imports: [EmptyState, MatButton, RouterLink],
  host: { class: 'page' },
  template: `
    <h1>Not for your role</h1>
    <app-empty-state
      heading="This screen belongs to somebody else’s work"
      [words]="
        session.state() === 'unlocked-offline'
          ? 'You are unlocked without network: you may log, nothing else, until the book can be reached and your PIN is checked.'
          : 'Nothing you logged is touched by that. Ask the foreman or the manager if you need it.'
      "
    >
      <a matButton="filled" routerLink="/">Back to your work</a>
    </app-empty-state>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotPermittedPage {
  protected readonly session = inject(SessionStore);
}
