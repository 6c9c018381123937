import type { Entry } from '@shared/entries/entry';
import type { Deps } from '../../../api/deps.js';
import { canonicalJson } from '../../../api/features/book/canonical-json.js';
import type { FaultTablet } from './fault-tablet';

/** What became of what somebody saw as saved. */
export interface Verdict {
  readonly entries: number;
  readonly faults: number;
  /**
   * Shown as saved, and not in the book (nor kept on the tablet with the reason why it can never be); or acknowledged
   * before it was in the book.
   */
  readonly lost: number;
  /** In the book twice, or in the book though it was not shown as saved. */
  readonly doubled: number;
  /** In the book with another author, tablet, number or content. */
  readonly misattributed: number;
  /** In the book, and not on a tablet of that shed that says it has seen everything. */
  readonly unseen: number;
  /** What exactly, in words. */
  readonly details: readonly string[];
}

interface Row {
  readonly id: string;
  readonly by: string;
  readonly deviceId: string;
  readonly deviceSeq: number;
  readonly body: string;
  readonly at: number;
}

/** What the book may rightly refuse: the poison, and closing again what still holds something undecided. */
const MAY_BE_REFUSED: ReadonlySet<string> = new Set(['loom-unknown', 'held-undecided']);
const DAY = 86_400_000;

export async function judgeRun(
  deps: Deps,
  tablets: readonly FaultTablet[],
  { faults, stuck, broken = [] }: { faults: number; stuck: boolean; broken?: readonly string[] },
): Promise<Verdict> {
  const details: string[] = stuck ? ['Something waits for ever.'] : [];
  const rows = await deps.reads.query<Row[]>(
    `SELECT "id", "by", "deviceId", "deviceSeq", "body", "at" FROM "entry"`,
  );
  const byId = new Map(rows.map((row) => [row.id, row]));
  const shown = new Map(tablets.flatMap((tablet) => tablet.shown).map((entry) => [entry.id, entry]));
  const say = (what: string, ids: readonly string[]): number => {
    if (ids.length > 0) details.push(`${what}: ${ids.slice(0, 5).join(', ')}`);
    return ids.length;
  };

  const refused = new Map<string, string>();
  for (const tablet of tablets)
    for (const record of await tablet.outbox.all())
      if (record.state === 'refused') refused.set(record.entry.id, record.code ?? '-');
  const lost = [...shown.values()].filter(
    ({ id }) => !byId.has(id) && !MAY_BE_REFUSED.has(refused.get(id) ?? ''),
  );
  const places = new Map<string, number>();
  for (const { deviceId, deviceSeq } of rows) {
    const place = `${deviceId} ${deviceSeq}`;
    places.set(place, (places.get(place) ?? 0) + 1);
  }
  const twice = [...places].filter(([, count]) => count > 1).map(([place]) => place);
  const neverShown = rows.filter(({ id }) => !shown.has(id)).map(({ id }) => id);
  const changed = rows.filter((row) => {
    const entry = shown.get(row.id);
    return entry && !isSame(row, entry);
  });
  const unseen = await notSeen(deps, tablets, rows);
  return {
    entries: shown.size,
    faults,
    lost:
      say(
        'lost',
        lost.map(({ id, deviceId, kind }) => `${kind} ${id} of ${deviceId} ${refused.get(id) ?? ''}`),
      ) + say('acknowledged, and not in the book then', broken),
    doubled: say('doubled', twice) + say('in the book, never shown as saved', neverShown),
    misattributed: say(
      'misattributed',
      changed.map(({ id }) => id),
    ),
    unseen: say('unseen', unseen) + (stuck ? 1 : 0),
    details,
  };
}

function isSame(row: Row, entry: Entry): boolean {
  return (
    row.by === entry.by &&
    row.deviceId === entry.deviceId &&
    row.deviceSeq === entry.deviceSeq &&
    row.body === canonicalJson(entry)
  );
}

/** The shed's entries of the last day that a tablet lacks. */
async function notSeen(deps: Deps, tablets: readonly FaultTablet[], rows: readonly Row[]): Promise<string[]> {
  const revoked = await deps.reads.query<{ id: string }[]>(
    `SELECT "id" FROM "device" WHERE "revokedAt" IS NOT NULL`,
  );
  const recent = rows.filter(({ at }) => at > deps.now() - DAY);
  const unseen: string[] = [];
  for (const tablet of tablets) {
    if (revoked.some(({ id }) => id === tablet.id)) continue;
    const has = new Set((await tablet.book.load()).entries.map(({ entry }) => entry['id']));
    for (const { id, deviceId, deviceSeq, at } of recent)
      if (!has.has(id))
        unseen.push(`${deviceId} ${deviceSeq} (${new Date(at).toISOString()}) on ${tablet.id}`);
  }
  return unseen;
}
