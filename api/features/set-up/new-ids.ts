import { randomInt } from 'node:crypto';
import { v7 as uuid } from 'uuid';

const LETTERS = 'abcdefghijkmnpqrstuvwxyz23456789';

/** An id short enough to stand with others in a shift's key (`<shed>:<date>:<pattern>`, 64 characters at most). */
export function shortId(): string {
  return Array.from({ length: 12 }, () => LETTERS[randomInt(LETTERS.length)]).join('');
}

/**
 * An id for a new version of a thing. Of two versions in force from one instant the one with the later id holds, so it
 * comes after those that are there, whatever their ids look like.
 */
export function newVersionId(
  versions: readonly { readonly id: string; readonly effectiveAt: number }[],
  effectiveAt: number,
): string {
  let id: string = uuid();
  for (const one of versions) while (one.effectiveAt === effectiveAt && one.id > id) id = `z${id}`;
  return id;
}
