import { ChangeDetectionStrategy, Component, effect, input, signal } from '@angular/core';

/** A square code (QR, ISO/IEC 18004) that a camera reads; black on white in every theme. What draws it is lazy. */
@Component({
  selector: 'app-square-code',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (drawn(); as code) {
      <svg
        [attr.viewBox]="'-4 -4 ' + (code.size + 8) + ' ' + (code.size + 8)"
        role="img"
        [attr.aria-label]="label()"
        shape-rendering="crispEdges"
      >
        <rect x="-4" y="-4" width="100%" height="100%" fill="#fff" />
        <path [attr.d]="code.path" fill="#000" />
      </svg>
    }
  `,
  styles: `
    :host {
      display: block;
      aspect-ratio: 1;
    }
    svg {
      display: block;
      width: 100%;
      height: 100%;
    }
  `,
})
export class SquareCode {
  /** What the camera reads. */
  readonly words = input.required<string>();
  /** What the picture is, for who does not see it. */
  readonly label = input.required<string>();

  protected readonly drawn = signal<{ readonly size: number; readonly path: string } | null>(null);

  constructor() {
    effect(() => void this.draw(this.words()));
  }

  /** Without what draws it (no network, and not kept yet) there is no picture; the words beside it do. */
  private async draw(words: string): Promise<void> {
    try {
      const { create } = (await import('qrcode')).default;
      const { size, data } = create(words, { errorCorrectionLevel: 'M' }).modules;
      const dark = Array.from(data, (bit, at) =>
        bit ? `M${at % size} ${Math.floor(at / size)}h1v1h-1z` : '',
      ).join('');
      if (words === this.words()) this.drawn.set({ size, path: dark });
    } catch {
      this.drawn.set(null);
    }
  }
}
