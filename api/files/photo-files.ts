import { randomUUID } from 'node:crypto';
import {
  closeSync,
  copyFileSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readdirSync,
  renameSync,
} from 'node:fs';
import { rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';

/** A name of our own making, never one that was sent. */
const NAME = /^[0-9a-f-]{36}\.jpg$/;

/** Where photos lie in the data folder. Each is written once and never changed. */
export function photoFolder(dataDir: string): string {
  const folder = join(dataDir, 'photos');
  mkdirSync(folder, { recursive: true, mode: 0o750 });
  return folder;
}

/** Writes a picture under a new name, on the disk when it resolves; the name. */
export async function writePhoto(dataDir: string, picture: Buffer): Promise<string> {
  const name = `${randomUUID()}.jpg`;
  const file = join(photoFolder(dataDir), name);
  const part = `${file}.part`;
  try {
    await writeFile(part, picture, { mode: 0o640, flush: true });
    renameSync(part, file);
    flush(photoFolder(dataDir));
  } catch (error) {
    await rm(part, { force: true });
    throw error;
  }
  return name;
}

export async function dropPhoto(dataDir: string, name: string): Promise<void> {
  await rm(join(photoFolder(dataDir), name), { force: true });
}

/**
 * Copies the photos that the other folder lacks, and says how many. They never change, so all backups share one folder
 * of copies, and taking or putting back one costs only what is new.
 */
export function copyPhotos(from: string, to: string): number {
  if (!existsSync(from)) return 0;
  const there = new Set(existsSync(to) ? readdirSync(to) : []);
  const lacking = readdirSync(from).filter((name) => NAME.test(name) && !there.has(name));
  if (lacking.length === 0) return 0;
  mkdirSync(to, { recursive: true, mode: 0o750 });
  for (const name of lacking) {
    const part = join(to, `${name}.part`);
    copyFileSync(join(from, name), part);
    flush(part);
    renameSync(part, join(to, name));
  }
  flush(to);
  return lacking.length;
}

function flush(path: string): void {
  const handle = openSync(path, 'r');
  try {
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
}
