import { createHash } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { ROOT } from './run.mjs';

/** A digest of files, folders (all in them, specs left out) and buffers: the same content, the same stamp. */
export function stampOf(parts) {
  const hash = createHash('sha256');
  for (const part of parts) {
    if (typeof part !== 'string') hash.update(part);
    else for (const file of filesIn(path.join(ROOT, part))) hash.update(file).update(readFileSync(file));
  }
  return hash.digest('hex');
}

function filesIn(top) {
  let stat;
  try {
    stat = statSync(top);
  } catch {
    return [];
  }
  if (stat.isFile()) return /\.spec\.ts$/.test(top) ? [] : [top];
  return readdirSync(top)
    .sort()
    .flatMap((name) => filesIn(path.join(top, name)));
}

export function isStale(file, stamp) {
  try {
    return readFileSync(path.join(ROOT, file), 'utf8') !== stamp;
  } catch {
    return true;
  }
}

export function remember(file, stamp) {
  mkdirSync(path.dirname(path.join(ROOT, file)), { recursive: true });
  writeFileSync(path.join(ROOT, file), stamp);
}
