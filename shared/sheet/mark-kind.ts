import type { CauseGroup } from '../contract/reference.js';

/** The marks of the cloth strip: each follows the cloth's own geometry, so that it reads without colour. */
export const MARK_KINDS = ['warp', 'weft', 'pern', 'tackler', 'waiting', 'care', 'planned'] as const;
export type MarkKind = (typeof MARK_KINDS)[number];

export const MARK_WORDS: Readonly<Record<MarkKind, string>> = {
  warp: 'warp',
  weft: 'weft',
  pern: 'pern change',
  tackler: 'tackler’s stop',
  waiting: 'waiting',
  care: 'cut, clean, check',
  planned: 'planned or shed stop',
};

/** Which mark a cause carries. The pern change is the one cause with a mark of its own. */
export function markOf(cause: string, group: CauseGroup): MarkKind {
  if (cause === 'pern-change') return 'pern';
  switch (group) {
    case 'warp':
      return 'warp';
    case 'weft':
      return 'weft';
    case 'loom':
    case 'warp-change':
      return 'tackler';
    case 'waiting':
      return 'waiting';
    case 'care':
      return 'care';
    case 'shed':
    case 'planned':
      return 'planned';
  }
}
