import { inject, makeEnvironmentProviders, provideEnvironmentInitializer } from '@angular/core';
import type { EnvironmentProviders } from '@angular/core';
import { MatIconRegistry } from '@angular/material/icon';
import { DomSanitizer } from '@angular/platform-browser';

/** Own drawings on a 24 × 24 grid, strokes only; a name here is a `svgIcon` of mat-icon. */
const PATHS = {
  warp: '<path d="M6 3v18M12 3v6m0 6v6M18 3v18"/>',
  weft: '<path d="M3 6h18M3 12h6m6 0h6M3 18h18"/>',
  pern: '<path d="M12 2.5l5 5v9l-5 5-5-5v-9z"/>',
  other: '<path d="M5 12h.01M12 12h.01M19 12h.01" stroke-width="4"/>',
  call: '<path d="M5 16c0-8 14-8 14 0M12 5v4M9 20h6"/>',
  loomside: '<path d="M3 5h18M3 19h18M7 5v14M12 5v4m0 6v4M17 5v14"/>',
  floor: '<path d="M3 4h7v6H3zM14 4h7v6h-7zM3 14h7v6H3zM14 14h7v6h-7z"/>',
  book: '<path d="M5 4h13v16H5zM9 4v16M12 9h3M12 13h3"/>',
  weeks: '<path d="M4 20V4M4 20h16M8 16l4-5 3 3 5-7"/>',
  tablet: '<path d="M5 3h14v18H5zM11 18h2"/>',
  person: '<path d="M12 4a4 4 0 1 0 0 8a4 4 0 0 0 0-8M4 21c1-8 15-8 16 0"/>',
  settings: '<path d="M4 7h9m4 0h3M15 5v4M4 17h3m4 0h9M9 15v4"/>',
  sync: '<path d="M4 12a8 8 0 0 1 14-5l2 2M20 4v5h-5M20 12a8 8 0 0 1-14 5l-2-2M4 20v-5h5"/>',
  look: '<path d="M12 4l9 16H3zM12 10v4M12 17.500v.01"/>',
  check: '<path d="M5 12.500l4.500 4.500L19 7"/>',
  close: '<path d="M6 6l12 12M18 6L6 18"/>',
  back: '<path d="M14 5l-7 7 7 7"/>',
  forward: '<path d="M10 5l7 7-7 7"/>',
  down: '<path d="M5 9l7 7 7-7"/>',
  up: '<path d="M5 15l7-7 7 7"/>',
  grip: '<path d="M5 9h14M5 15h14"/>',
  erase: '<path d="M9 5h11v14H9l-6-7zM12 9.500l5 5M17 9.500l-5 5"/>',
  label: '<path d="M4 9V4h5M15 4h5v5M20 15v5h-5M9 20H4v-5M9 9h2v2H9zM13 13h2v2h-2zM14 9h1M9 14h1"/>',
  add: '<path d="M12 5v14M5 12h14"/>',
  remove: '<path d="M5 12h14"/>',
  print: '<path d="M7 9V3h10v6M7 17H4V9h16v8h-3M7 14h10v7H7z"/>',
  leave: '<path d="M10 4H4v16h6M9 12h11M16 8l4 4-4 4"/>',
  export: '<path d="M12 15V4M8 8l4-4 4 4M4 14v6h16v-6"/>',
} as const;

export type IconName = keyof typeof PATHS;

/** Registers the shipped icons, so that nothing is fetched for them. */
export function provideIcons(): EnvironmentProviders {
  return makeEnvironmentProviders([
    provideEnvironmentInitializer(() => {
      const registry = inject(MatIconRegistry);
      const sanitizer = inject(DomSanitizer);
      for (const [name, path] of Object.entries(PATHS))
        registry.addSvgIconLiteral(
          name,
          sanitizer.bypassSecurityTrustHtml(
            `<svg viewBox="0 0 24 24" fill="none" stroke="currentColor" stroke-width="2.2" stroke-linecap="round" stroke-linejoin="round">${path}</svg>`,
          ),
        );
    }),
  ]);
}
