import { existsSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Deps } from '../deps.js';
import { backupFolder, listBackups } from './backup-files.js';
import { takeBackup, type TakenBackup } from './take-backup.js';
import { messageOf } from './verify-book.js';

/** How often the server looks whether a backup is due or asked for, ms. */
const LOOK = 1_000;
/** After a failed one, the next try is no sooner, ms. */
const AGAIN = 10 * 60_000;

type BackupDeps = Pick<Deps, 'writer' | 'settings' | 'now' | 'log'>;

/** What a command that asked for a backup finds in the file that it asked by. */
export type BackupAnswer = { readonly taken: TakenBackup } | { readonly failed: string };

export const ASKED = '.asked';
export const ANSWERED = '.answered';

/**
 * Takes a backup at the set hour, or as soon as the server runs again after it, and when a command beside the server
 * asks by a file in the backups' folder: whoever may write there may have one. Stops when called.
 */
export function startBackups(deps: BackupDeps): () => void {
  let triedAt = -Infinity;
  let busy: Promise<unknown> | null = null;
  const look = (): void => {
    if (busy || deps.writer.closing) return;
    const asked = askedFor(deps.settings.dataDir);
    const due = deps.now() - triedAt >= AGAIN && isDue(deps);
    if (asked.length === 0 && !due) return;
    if (due) triedAt = deps.now();
    busy = attempt(deps)
      .then((answer) => asked.forEach((file) => answerTo(file, answer)))
      .finally(() => (busy = null));
  };
  const timer = setInterval(look, LOOK);
  timer.unref();
  return () => clearInterval(timer);
}

async function attempt(deps: BackupDeps): Promise<BackupAnswer> {
  try {
    const taken = await takeBackup(deps);
    deps.log.info(taken, 'a backup was taken and verified');
    return { taken };
  } catch (error) {
    deps.log.error(error, 'no backup could be taken; the ones before it are untouched');
    return { failed: messageOf(error) };
  }
}

/** Whether the set hour came since the last backup. */
export function isDue({ settings, now }: Pick<Deps, 'settings' | 'now'>): boolean {
  if (settings.backupHour === null) return false;
  const hour = new Date(now());
  hour.setHours(settings.backupHour, 0, 0, 0);
  if (hour.getTime() > now()) hour.setDate(hour.getDate() - 1);
  return (listBackups(settings.dataDir).at(-1)?.at ?? -Infinity) < hour.getTime();
}

function askedFor(dataDir: string): string[] {
  const folder = join(dataDir, 'backups');
  if (!existsSync(folder)) return [];
  return readdirSync(folder)
    .filter((name) => name.endsWith(ASKED))
    .map((name) => join(backupFolder(dataDir), name));
}

function answerTo(file: string, answer: BackupAnswer): void {
  writeFileSync(file.replace(ASKED, ANSWERED), JSON.stringify(answer));
  rmSync(file, { force: true });
}
