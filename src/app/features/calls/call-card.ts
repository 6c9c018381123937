import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { clockTime } from '../../ui/clock-time';
import { lower } from '../../ui/lower';
import type { CallStep } from './call-log';
import { CallsStore, type CallRow } from './calls-store';

/** A call: which loom, where, since when, what the weaver says; what the tackler may say of it. */
@Component({
  selector: 'app-call-card',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, RouterLink],
  host: { role: 'article', '[attr.aria-label]': "'Loom ' + row().loom.number" },
  template: `
    <div class="head">
      <a class="loom" [routerLink]="['/calls/loom', row().loom.id]">
        <span class="small">Loom</span> <b class="num">{{ row().loom.number }}</b>
      </a>
      <p class="where">
        <b>Alley {{ row().loom.alley }}</b>
        @if (row().ownAlley) {
          <span class="flag">yours</span>
        }
        <br /><span class="muted"
          >row {{ row().loom.row }}, place {{ row().loom.position }} · {{ row().cloth }}</span
        >
      </p>
      <p class="wait" [class.long]="row().minutes >= 10 && row().step === null">
        <b class="num">{{ row().minutes }}</b> min<br /><span class="small muted num"
          >since {{ since() }}</span
        >
      </p>
    </div>
    @if (row().words) {
      <p class="words">“{{ row().words }}”</p>
    }
    <p class="muted">
      @if (row().stands; as stands) {
        Stands for {{ lower(stands.words) }} since <span class="num">{{ stoodSince() }}</span>
      } @else {
        Not logged as standing
      }
    </p>
    @if (unsure()) {
      <p class="flag look">{{ unsure() }}</p>
    }
    @if (row().step === null) {
      <button matButton="filled" class="first" type="button" (click)="said.emit('take')">Take it</button>
    } @else if (row().mine) {
      <div class="acts">
        @if (row().step === 'take') {
          <button matButton="filled" class="first" type="button" (click)="said.emit('arrive')">
            I am there
          </button>
        } @else {
          <button matButton="filled" class="first" type="button" (click)="said.emit('done')">Done</button>
        }
        <button matButton="outlined" class="other" type="button" (click)="said.emit('leave')">
          Leave it undone
        </button>
      </div>
    } @else {
      <p class="flag">{{ takenWords() }}</p>
    }
  `,
  styles: `
    :host {
      display: flex;
      flex-direction: column;
      gap: var(--gap-1);
      padding: 12px var(--gap-2) var(--gap-2);
      border: 1px solid var(--line);
      border-radius: var(--r);
      background: var(--raised);
    }
    .head {
      display: grid;
      grid-template-columns: auto 1fr auto;
      gap: 12px;
      align-items: start;
    }
    .loom {
      display: grid;
      justify-items: center;
      align-content: center;
      min-width: 64px;
      min-height: 64px;
      padding: 2px 8px;
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      color: var(--ink);
      text-decoration: none;
      line-height: 1.1;
    }
    .loom b {
      font-size: 1.75rem;
    }
    .where {
      min-width: 0;
    }
    .where .flag {
      display: inline-block;
    }
    .wait {
      text-align: right;
      white-space: nowrap;
    }
    .wait b {
      font-size: 1.5rem;
    }
    .long b {
      color: var(--madder);
    }
    .words {
      font-size: 1.125rem;
    }
    .acts {
      display: grid;
      grid-template-columns: minmax(0, 1fr) minmax(0, 1fr);
      gap: var(--gap-1);
      margin-top: auto;
    }
    .first,
    .other {
      min-height: 64px;
      font-size: 1.125rem;
    }
    .first {
      width: 100%;
      margin-top: auto;
    }
  `,
})
export class CallCard {
  readonly row = input.required<CallRow>();
  readonly said = output<CallStep>();

  private readonly store = inject(CallsStore);
  protected readonly lower = lower;
  protected readonly since = computed(() => clockTime(this.row().at, this.store.timeZone()));
  protected readonly stoodSince = computed(() =>
    clockTime(this.row().stands?.since ?? this.row().at, this.store.timeZone()),
  );
  /** What others do not know. */
  protected readonly unsure = computed(() => {
    const { state, step, stepSent } = this.row();
    if (state === 'waiting' || state === 'later') return 'Not sent: only this device knows of the call';
    if (state === 'held' || state === 'refused') return 'The book did not take the call: it needs a look';
    return step !== null && !stepSent ? 'Not sent: the others still see it waiting' : '';
  });
  protected readonly takenWords = computed(() => {
    const { taker, step, stepAt } = this.row();
    const by = taker ? ` by ${taker}` : '';
    const at = stepAt === null ? '' : ` ${clockTime(stepAt, this.store.timeZone())}`;
    return step === 'arrive' ? `Somebody there since${at}${taker ? `: ${taker}` : ''}` : `Taken${by}${at}`;
  });
}
