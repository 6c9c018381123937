import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { BringIn, type BroughtIn } from '../offline/bring-in';

/** For the foreman: a file that a tablet exported goes into the book, and what became of each entry is listed. */
@Component({
  selector: 'app-bring-in-file',
  imports: [MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <input #chosen type="file" accept="application/json,.json" hidden (change)="bringIn(chosen)" />
    <button matButton="outlined" type="button" [disabled]="busy()" (click)="chosen.click()">
      {{ busy() ? 'Bringing in …' : 'Bring in a file' }}
    </button>
    <p class="small" role="status">{{ said() }}</p>
    @if (brought(); as done) {
      <ul class="small">
        @for (other of done.others; track other.why) {
          <li>
            <b>{{ other.count }}</b> {{ other.why }}
          </li>
        }
      </ul>
    }
  `,
})
export class BringInFile {
  private readonly files = inject(BringIn);

  protected readonly busy = signal(false);
  protected readonly said = signal('');
  protected readonly brought = signal<BroughtIn | null>(null);

  protected async bringIn(chosen: HTMLInputElement): Promise<void> {
    const file = chosen.files?.[0];
    if (!file) return;
    this.busy.set(true);
    this.brought.set(null);
    try {
      const brought = await this.files.file(await file.text());
      this.brought.set(brought);
      this.said.set(wordsFor(brought));
    } catch {
      this.said.set('This file could not be read. Nothing was brought in; the file is unchanged.');
    } finally {
      this.busy.set(false);
      // The same file may be chosen again.
      chosen.value = '';
    }
  }
}

function wordsFor(brought: BroughtIn | null): string {
  if (!brought) return 'This is not a file that a tablet exported here. Nothing was brought in.';
  const inBook = `${brought.inBook} ${brought.inBook === 1 ? 'entry is' : 'entries are'} in the book.`;
  return brought.stopped === null
    ? inBook
    : `${inBook} Then it stopped: ${brought.stopped} The same file may be brought in again.`;
}
