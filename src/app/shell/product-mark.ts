import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The product's mark: a plain weave, three ends by three picks. */
@Component({
  selector: 'app-product-mark',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg viewBox="0 0 26 26" width="26" height="26">
      <rect width="26" height="26" rx="5" class="ground" />
      <path class="warp" d="M6.500 4v18M13 4v18M19.500 4v18" />
      <path
        class="weft"
        d="M3.500 7h5.500M17 7h5.500M9.500 13h7M3.500 13h1M21.500 13h1M3.500 19h5.500M17 19h5.500"
      />
    </svg>
  `,
  styles: `
    :host {
      display: inline-block;
      line-height: 0;
    }
    .ground {
      fill: var(--flax);
    }
    path {
      fill: none;
      stroke: var(--on-flax);
      stroke-width: 3;
    }
    .warp {
      opacity: 0.55;
    }
  `,
})
export class ProductMark {}
