import type { PhotoOnWire } from '../../../shared/contract/calls.js';
import type { PhotoRow } from '../../database/entities/index.js';

/** Where the file lies and who sent it stay here. */
export function toPhoto({ id, place, width, height, bytes }: PhotoRow): PhotoOnWire {
  return { id, place, width, height, bytes };
}
