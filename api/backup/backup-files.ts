import { mkdirSync, readdirSync } from 'node:fs';
import { join } from 'node:path';

/** `book-20260310-093000.sqlite`, by UTC: names sort as moments do. */
const NAME = /^book-(\d{4})(\d{2})(\d{2})-(\d{2})(\d{2})(\d{2})\.sqlite$/;

export interface BackupFile {
  readonly file: string;
  /** Milliseconds since 1970, to the second. */
  readonly at: number;
}

/** Where backups lie: beside the book. Copy them to another machine too: one disk is one disk. */
export function backupFolder(dataDir: string): string {
  const folder = join(dataDir, 'backups');
  mkdirSync(folder, { recursive: true, mode: 0o750 });
  return folder;
}

export function backupName(at: number): string {
  return `book-${stampOf(at)}.sqlite`;
}

/** A moment in a file's name: `20260310-093000`. */
export function stampOf(at: number): string {
  return new Date(at).toISOString().slice(0, 19).replace(/[-:]/g, '').replace('T', '-');
}

/** Copies of photos, which all backups share: a photo never changes once it is written. */
export function copiedPhotosFolder(dataDir: string): string {
  return join(backupFolder(dataDir), 'photos');
}

/** The finished backups, oldest first. */
export function listBackups(dataDir: string): BackupFile[] {
  const folder = backupFolder(dataDir);
  return readdirSync(folder)
    .sort()
    .flatMap((name) => {
      const [, year, month, day, hour, minute, second] = NAME.exec(name) ?? [];
      if (second === undefined) return [];
      const at = Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${second}Z`);
      return [{ file: join(folder, name), at }];
    });
}
