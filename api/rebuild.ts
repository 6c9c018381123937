import { CannotStart } from './cannot-start.js';
import { rebuildBook } from './features/book/rebuild.js';
import { openDeps } from './open-deps.js';
import { BadSetting, readSettings } from './settings.js';

/** How many differences are named. */
const NAMED = 20;

/** `npm run rebuild`: makes every loom line anew from the entries. Exit code 1 where anything is not what it was. */
async function main(): Promise<void> {
  const settings = readSettings({ ...process.env, LOG_LEVEL: process.env['LOG_LEVEL'] ?? 'warn' });
  const opened = await openDeps(settings);
  try {
    const { different, unlikeSigned, ...counts } = await opened.deps.writer.write(rebuildBook);
    console.log(
      JSON.stringify({
        ...counts,
        different: different.length,
        unlikeSigned: unlikeSigned.length,
        names: [...different.slice(0, NAMED), ...unlikeSigned.slice(0, NAMED)],
      }),
    );
    const same = different.length === 0 && unlikeSigned.length === 0;
    console.log(
      same
        ? `${counts.lines} lines were made anew from the entries: every byte is as it was.`
        : `${counts.lines} lines were made anew from the entries. ${different.length} rows are not what they were, ${unlikeSigned.length} closed shifts do not give what was signed. The entries and what was signed are untouched; show this to whoever keeps the program.`,
    );
    if (!same) process.exitCode = 1;
  } finally {
    await opened.close();
  }
}

main().catch((error: unknown) => {
  if (error instanceof CannotStart || error instanceof BadSetting) console.error(error.message);
  else console.error(error);
  process.exit(1);
});
