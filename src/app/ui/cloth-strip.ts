import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  ElementRef,
  afterNextRender,
  computed,
  effect,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { stripGeometry } from './strip-geometry';
import type { StripLine } from './strip-geometry';
import { stripWords } from './strip-line';
import { OVERHANG, PRINT_PALETTE, paintStrip, paletteOf } from './strip-painter';
import { ThemeChanges } from './theme-changes';

/** Dots a CSS pixel (1/96 in) on paper: 288 an inch. */
const PRINT_RATIO = 3;

/**
 * The cloth strip: a loom's shift as a ribbon, woven while the loom ran, with a gap for each stop. One canvas; the
 * text equivalent is its label.
 */
@Component({
  selector: 'app-cloth-strip',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {
    role: 'img',
    '[attr.aria-label]': 'words()',
    '[style.height.px]': 'height() + 2 * overhang',
  },
  template: `<canvas #canvas aria-hidden="true"></canvas>`,
  styles: `
    :host {
      display: block;
      width: 100%;
      min-width: 0;
    }
    canvas {
      display: block;
      width: 100%;
      height: 100%;
    }
  `,
})
export class ClothStrip {
  readonly line = input.required<StripLine>();
  /** Height of the cloth, px. */
  readonly height = input(22);
  /** Whose strip it is, first in the text equivalent: "Loom 14". */
  readonly label = input('');

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly theme = inject(ThemeChanges);
  private readonly canvas = viewChild.required<ElementRef<HTMLCanvasElement>>('canvas');
  private readonly width = signal(0);
  private frame = 0;
  private drawn = false;

  protected readonly overhang = OVERHANG;
  protected readonly words = computed(() => {
    const words = stripWords(this.line());
    return this.label() ? `${this.label()}: ${words}` : words;
  });
  private readonly geometry = computed(() => stripGeometry(this.line(), this.width()));

  constructor() {
    const destroyed = inject(DestroyRef);
    afterNextRender(() => {
      const element = this.host.nativeElement;
      this.width.set(element.clientWidth);
      if (typeof ResizeObserver === 'undefined') return;
      const observer = new ResizeObserver(() => this.width.set(element.clientWidth));
      observer.observe(element);
      destroyed.onDestroy(() => observer.disconnect());
    });
    effect(() => {
      this.geometry();
      this.height();
      this.theme.version();
      // A printer takes the page as it stands when the event returns.
      if (this.theme.printing()) this.paint();
      else this.paintSoon();
    });
    destroyed.onDestroy(() => cancelAnimationFrame(this.frame));
  }

  /**
   * In the next frame: by then the card around it has its classes, and several changes are one drawing. Drawn anew it
   * comes a frame later still: the figures beside it first.
   */
  private paintSoon(): void {
    cancelAnimationFrame(this.frame);
    this.frame = requestAnimationFrame(() => {
      if (this.drawn) this.frame = requestAnimationFrame(() => this.paint());
      else this.paint();
    });
  }

  private paint(): void {
    const geometry = this.geometry();
    if (geometry.width <= 0) return;
    const canvas = this.canvas().nativeElement;
    const printing = this.theme.printing();
    // A printer has finer dots than a screen.
    const ratio = Math.max(window.devicePixelRatio || 1, printing ? PRINT_RATIO : 1);
    const wide = Math.round(geometry.width * ratio);
    const tall = Math.round((this.height() + 2 * OVERHANG) * ratio);
    if (canvas.width !== wide || canvas.height !== tall) {
      canvas.width = wide;
      canvas.height = tall;
    }
    const context = canvas.getContext('2d');
    if (!context) return;
    const palette = printing ? PRINT_PALETTE : paletteOf(this.host.nativeElement);
    paintStrip(context, geometry, this.height(), ratio, palette);
    this.drawn = true;
  }
}
