import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { backupFolder } from './backup/backup-files.js';
import { ANSWERED, ASKED, type BackupAnswer } from './backup/backup-hours.js';
import { takeBackup } from './backup/take-backup.js';
import { CannotStart } from './cannot-start.js';
import { lockDataFolder } from './database/data-folder-lock.js';
import { openDeps } from './open-deps.js';
import { BadSetting, readSettings, type Settings } from './settings.js';

const PATIENCE = 10 * 60_000;

/** `npm run backup`: a verified copy of the book now, taken by the running server where one runs. */
async function main(): Promise<void> {
  const settings = readSettings({ ...process.env, LOG_LEVEL: process.env['LOG_LEVEL'] ?? 'warn' });
  const answer = isInUse(settings) ? await askServer(settings) : await takeAlone(settings);
  if ('failed' in answer) throw new CannotStart(`No backup was taken: ${answer.failed}`);
  const { file, entries } = answer.taken;
  console.log(
    `${file} holds ${entries} entries; it was opened and verified. Copy it to another machine too.`,
  );
}

function isInUse({ dataDir }: Settings): boolean {
  if (!existsSync(dataDir)) throw new CannotStart(`There is no data folder ${dataDir}. Set DATA_DIR.`);
  try {
    lockDataFolder(dataDir).release();
    return false;
  } catch (error) {
    if (error instanceof CannotStart) return true;
    throw error;
  }
}

async function takeAlone(settings: Settings): Promise<BackupAnswer> {
  const opened = await openDeps(settings);
  try {
    return { taken: await takeBackup(opened.deps) };
  } finally {
    await opened.close();
  }
}

async function askServer({ dataDir }: Settings): Promise<BackupAnswer> {
  const asked = join(backupFolder(dataDir), `${process.pid}${ASKED}`);
  const answered = asked.replace(ASKED, ANSWERED);
  writeFileSync(asked, '');
  const until = Date.now() + PATIENCE;
  while (existsSync(asked) && Date.now() < until) await wait(200);
  if (!existsSync(answered)) {
    rmSync(asked, { force: true });
    return { failed: 'whoever has the data folder did not answer. Stop it, then run this again.' };
  }
  const answer = JSON.parse(readFileSync(answered, 'utf8')) as BackupAnswer;
  rmSync(answered);
  return answer;
}

main().catch((error: unknown) => {
  if (error instanceof CannotStart || error instanceof BadSetting) console.error(error.message);
  else console.error(error);
  process.exit(1);
});
