import { pathToFileURL } from 'node:url';
import { CannotStart } from '../cannot-start.js';
import { MetaRow, MillRow, ShiftRow } from '../database/entities/index.js';
import type { Deps } from '../deps.js';
import { ingestEntries } from '../features/book/ingest.js';
import { ensureShifts } from '../features/book/shifts.js';
import { shiftOf } from '../features/book/which-shift.js';
import { openDeps } from '../open-deps.js';
import { BadSetting, readSettings } from '../settings.js';
import { demoBegins, DEMO_WEEKS, demoPatterns, patternAt, workingDate } from './calendar.js';
import type { DemoPush } from './daybook.js';
import { DEMO_SHED, demoMill } from './mill.js';
import { demoPeople } from './people.js';
import { plantMill, plantPeople, plantWarps } from './plant-demo.js';
import { accountWords, DEMO_PASSWORD, DEMO_PIN } from './accounts.js';
import { makeRoom } from './make-room.js';
import { SEEDED_AT, SEEDED_WHOLE } from './seed-marks.js';
import { simulate } from './simulator.js';

const DEMO_SEED = 1_204;
const DAY = 86_400_000;

export type Seeded =
  | { readonly made: false; readonly seededAt: number | null }
  | { readonly made: true; readonly entries: number; readonly held: number };

/**
 * Plants the demo mill in an empty book and lets its twelve weeks go through the server's own ingest, push by push, as
 * its tablets would have sent them. A book that is not empty is left as it is.
 */
export async function seedDemo(
  deps: Pick<Deps, 'writer' | 'reads' | 'passwords' | 'now'>,
  say: (words: string) => void,
  { seed = DEMO_SEED, weeks = DEMO_WEEKS } = {},
): Promise<Seeded> {
  if ((await deps.reads.getRepository(MillRow).count()) > 0) {
    const seeded = await deps.reads.getRepository(MetaRow).findOneBy({ key: SEEDED_AT });
    return { made: false, seededAt: seeded ? Number(seeded.value) : null };
  }
  const now = deps.now();
  const begins = demoBegins(now, weeks);
  const mill = demoMill(begins);
  const people = demoPeople();
  const secrets = {
    pinHash: await deps.passwords.hash(DEMO_PIN),
    passwordHash: await deps.passwords.hash(DEMO_PASSWORD),
  };
  const shifts = await deps.writer.write(async (tx) => {
    await plantMill(tx, mill, { begins, now });
    await plantPeople(tx, people, secrets, begins);
    await tx.insert(MetaRow, { key: SEEDED_AT, value: String(now) });
    await ensureShifts(tx, begins, now + DAY);
    const rows = await tx.find(ShiftRow, { where: { shedId: DEMO_SHED }, order: { startsAt: 'ASC' } });
    return rows.map(shiftOf).filter((shift) => shift.startsAt <= now);
  });
  say(`The mill stands: 24 looms, ${people.length} people, ${shifts.length} shifts in ${weeks} weeks.`);
  const patterns = demoPatterns().map((pattern) => pattern.id);
  const { warps, pushes } = simulate({ seed, now, mill, people, shifts, patterns });
  await deps.writer.write((tx) => plantWarps(tx, warps));
  const counted = await sendAll(deps, pushes, say);
  await deps.writer.write((tx) => tx.insert(MetaRow, { key: SEEDED_WHOLE, value: 'yes' }));
  return { made: true, ...counted };
}

async function sendAll(
  { writer }: Pick<Deps, 'writer'>,
  pushes: readonly DemoPush[],
  say: (words: string) => void,
): Promise<{ entries: number; held: number }> {
  const all = pushes.reduce((sum, push) => sum + push.entries.length, 0);
  let entries = 0;
  let held = 0;
  let told = 0;
  for (const { deviceId, sentAt, entries: sent } of pushes) {
    const { results } = await writer.write((tx) =>
      ingestEntries(tx, sent, {
        deviceId,
        deviceRevoked: false,
        tabletShedId: deviceId === 'demo-office' ? null : DEMO_SHED,
        sentAt,
        serverNow: sentAt,
      }),
    );
    for (const result of results) {
      if (result.result === 'held') held++;
      else if (result.result !== 'stored')
        throw new Error(`The book did not take an entry of the demo: ${JSON.stringify(result)}`);
    }
    entries += sent.length;
    if (entries / all >= told + 0.1) {
      told = Math.floor((entries / all) * 10) / 10;
      say(`${Math.round(told * 100)}% of ${all.toLocaleString('en-GB')} entries are in the book.`);
    }
  }
  return { entries, held };
}

function shiftAt(moment: number): string {
  return `${workingDate(moment)} ${patternAt(moment)}`;
}

async function main(): Promise<void> {
  const settings = readSettings({ ...process.env, LOG_LEVEL: process.env['LOG_LEVEL'] ?? 'warn' });
  makeRoom(settings.dataDir, { fresh: process.argv.includes('--fresh') });
  const opened = await openDeps(settings);
  try {
    const began = Date.now();
    const seeded = await seedDemo(opened.deps, console.log);
    if (seeded.made) {
      const seconds = ((Date.now() - began) / 1000).toFixed(1);
      console.log(
        `The demo mill is made: ${seeded.entries.toLocaleString('en-GB')} entries in ${seconds} s.`,
      );
    } else {
      console.log('The demo mill is there already; nothing was changed.');
      if (shiftAt(Date.now()) !== shiftAt(seeded.seededAt ?? 0))
        console.log(
          'A shift has begun since, in which nobody logs: `npm run demo -- --fresh` makes the mill anew up to this minute.',
        );
    }
    console.log(accountWords(Date.now()));
  } finally {
    await opened.close();
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href)
  main().catch((error: unknown) => {
    if (error instanceof CannotStart || error instanceof BadSetting) console.error(error.message);
    else console.error(error);
    process.exit(1);
  });
