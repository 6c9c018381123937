import { ChangeDetectionStrategy, Component } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialogModule } from '@angular/material/dialog';

/** Asks before something typed is lost. Closes with true to leave. */
@Component({
  selector: 'app-leave-dialog',
  imports: [MatButton, MatDialogModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <h2 matDialogTitle>Leave without saving?</h2>
    <mat-dialog-content>
      <p>What you typed here is not saved yet. If you leave now it is lost; what was saved before stays.</p>
    </mat-dialog-content>
    <mat-dialog-actions align="end">
      <button matButton="outlined" type="button" [matDialogClose]="true">Leave without saving</button>
      <button matButton="filled" type="button" [matDialogClose]="false" cdkFocusInitial>Stay here</button>
    </mat-dialog-actions>
  `,
})
export class LeaveDialog {}
