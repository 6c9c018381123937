import { NgTemplateOutlet } from '@angular/common';
import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  inject,
  input,
  output,
} from '@angular/core';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { formatCount, formatMinutes, formatPercent, formatRate } from '@shared/figures/format';
import { isNoFigure, noFigureSentence, type Figure } from '@shared/figures/no-figure';
import { ClothStrip } from '../../ui/cloth-strip';
import { callWords } from './call-words';
import type { LoomView } from './loom-view';
import { BUTTON_CAUSES } from './stop-choices';

/** How long a finger rests on a button to say "still standing". */
const LONG_PRESS = 600;

/** A finger that bounces is one tap. A second stop takes a weaver longer than this. */
const REPEAT = 400;

/** So far a resting finger may stray, px. */
const STRAY = 12;

/** What is being saved on this loom, was just saved, or could not be. */
export interface CardAct {
  readonly loomId: string;
  readonly cause: string;
  readonly state: 'saving' | 'saved' | 'failed';
  /** For `failed`: what happened, what is safe, what to do. */
  readonly sentence: string;
}

/** One loom of the set: its strip, its figures so far, and four large buttons. A loom that stands turns to ink. */
@Component({
  selector: 'app-loom-card',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ClothStrip, MatIcon, NgTemplateOutlet, RouterLink],
  host: {
    role: 'group',
    '[attr.aria-label]': "'Loom ' + view().loom.number",
    '[attr.data-loom]': 'view().loom.number',
    '[class.stands]': 'view().standing !== null',
    '[class.large]': 'large()',
    '[class.dense]': 'dense()',
  },
  templateUrl: './loom-card.html',
  styleUrl: './loom-card.scss',
})
export class LoomCard {
  readonly view = input.required<LoomView>();
  readonly act = input<CardAct | null>(null);
  /** One loom at a time, on a phone. */
  readonly large = input(false);
  /** Something was just logged: the bar (projected) takes the place of the marks. */
  readonly acted = input(false);
  /** More than six looms share the screen. */
  readonly dense = input(false);
  readonly timeZone = input('UTC');

  /** A tap: it stood and runs again. */
  readonly stopped = output<string>();
  /** A long press: it stands. */
  readonly stands = output<string>();
  readonly other = output<void>();
  readonly running = output<void>();
  readonly changeCause = output<void>();
  readonly call = output<void>();

  protected readonly buttons = BUTTON_CAUSES;
  protected readonly stripHeight = computed(() => (this.large() ? 34 : this.dense() ? 16 : 22));
  protected readonly efficiency = computed(() => {
    const figure = this.view().efficiency;
    return isNoFigure(figure) ? null : formatPercent(figure).replace('%', '');
  });
  protected readonly noEfficiency = computed(() => reasonOf(this.view().efficiency));
  protected readonly stood = computed(() => {
    const standing = this.view().standing;
    return standing ? formatMinutes(Math.floor(standing.minutes)) : '';
  });
  protected readonly rates = computed(() => {
    const { warpRate, weftRate, soFar } = this.view();
    // Picks so far are at most so many: breaks per pick are at least these.
    const shown = (figure: Figure) =>
      isNoFigure(figure) ? '–' : `${soFar && figure > 0 ? '≥' : ''}${formatRate(figure)}`;
    return { warp: shown(warpRate), weft: shown(weftRate) };
  });
  protected readonly unlogged = computed(() => {
    const minutes = this.view().unlogged;
    return minutes === null || minutes < 1 ? '' : `${formatMinutes(Math.round(minutes))} unlogged`;
  });
  /** Anything that has to be seen beside the figures. */
  protected readonly marked = computed(
    () =>
      this.view().needsStart || this.view().overPossible || this.view().notSent > 0 || this.callSays() !== '',
  );
  protected readonly callSays = computed(() => callWords(this.view().call, this.timeZone()));

  private timer: ReturnType<typeof setTimeout> | undefined;
  private pressed = false;
  private restsAt = 0;
  private lastTap: { readonly key: string; readonly at: number } | null = null;

  constructor() {
    inject(DestroyRef).onDestroy(() => clearTimeout(this.timer));
  }

  protected countOf(cause: string): string {
    const { warpBreaks, weftBreaks, perns } = this.view();
    const count = cause === 'warp-break' ? warpBreaks : cause === 'weft-break' ? weftBreaks : perns;
    return formatCount(count);
  }

  protected stateOf(cause: string): CardAct['state'] | '' {
    const act = this.act();
    return act?.cause === cause ? act.state : '';
  }

  protected rest(cause: string, event: PointerEvent): void {
    this.pressed = false;
    this.restsAt = event.clientX;
    clearTimeout(this.timer);
    this.timer = setTimeout(() => {
      this.pressed = true;
      this.stands.emit(cause);
    }, LONG_PRESS);
  }

  /** A finger on its way elsewhere does not rest. */
  protected move(event: PointerEvent): void {
    if (Math.abs(event.clientX - this.restsAt) > STRAY) clearTimeout(this.timer);
  }

  protected lift(): void {
    clearTimeout(this.timer);
  }

  protected tap(cause: string, event: Event): void {
    clearTimeout(this.timer);
    // The click that ends a long press is not a tap.
    if (!this.pressed && !this.repeats(cause, event.timeStamp)) this.stopped.emit(cause);
    this.pressed = false;
  }

  /** The same stop on the same loom again (a phone's one card shows many looms), and not because it failed. */
  private repeats(cause: string, at: number): boolean {
    const key = `${this.view().loom.id} ${cause}`;
    const last = this.lastTap;
    if (last?.key === key && at - last.at < REPEAT && this.stateOf(cause) !== 'failed') return true;
    this.lastTap = { key, at };
    return false;
  }
}

function reasonOf(figure: Figure): string {
  return isNoFigure(figure) ? noFigureSentence(figure) : '';
}
