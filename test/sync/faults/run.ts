import type { EntryDraft } from '../../../src/app/offline/entry-draft';
import { revokeDevice } from '../../../api/features/devices/devices.service.js';
import { changePerson } from '../../../api/features/people/people.service.js';
import { permissionsOf } from '../../../shared/contract/roles.js';
import type { Principal } from '../../../api/middleware/principal.js';
import { TEST_PEOPLE, testShiftKey } from '../../../api/testing/test-mill.js';
import { FaultServer } from './fault-server';
import { FaultTablet } from './fault-tablet';
import { planOf, TAPS, type Round, type RunPlan, type ServerEvent, type Tap, type Turn } from './plan';
import { NO_SABOTAGE, type Sabotage } from './sabotage';
import { tabletId } from './template-mill';
import { judgeRun, type Verdict } from './verdict';

const LOOMS = ['n1', 'n2', 'n3', 'n4'];
const AUTHORS = [TEST_PEOPLE.weaver.id, TEST_PEOPLE.otherWeaver.id];
/** Whoever withdraws tablets and disables people. */
export const MANAGER_DESK: Principal = {
  person: { id: 'maud', sessionId: '-', roles: ['manager'], shedIds: [] },
  device: null,
  permissions: permissionsOf(['manager']),
};
/** After so many tries with a sound wire something is stuck for ever. */
const TRIES = 80;

/** One run: three tablets, a hundred taps on each, one server, and everything that the seed's schedule does to them. */
export async function runFaults(
  seed: number,
  template: string,
  sabotage: Sabotage = NO_SABOTAGE,
): Promise<Verdict> {
  const run = new FaultRun(planOf(seed), await FaultServer.start(template, sabotage), sabotage);
  try {
    return await run.go();
  } finally {
    await run.server.close();
  }
}

class FaultRun {
  private readonly tablets: FaultTablet[];
  private faults = 0;
  private readonly acknowledged = new Set<string>();
  /** Acknowledged, and not in the book at that time. */
  private readonly broken: string[] = [];
  /** Whether the third tablet is withdrawn: in the book, and in the backup at hand. */
  private revoked = false;
  private revokedInBackup = false;

  constructor(
    private readonly plan: RunPlan,
    readonly server: FaultServer,
    sabotage: Sabotage,
  ) {
    this.tablets = plan.clockErrors.map(
      (clockError, n) =>
        new FaultTablet({
          id: tabletId(n),
          faults: plan.wire[n] ?? [],
          url: () => server.url,
          now: () => server.clock.now,
          clockError,
          sabotage,
        }),
    );
    this.faults += plan.clockErrors.filter((error) => error !== 0).length;
  }

  async go(): Promise<Verdict> {
    for (const round of this.plan.rounds) await this.round(round);
    const tries = await this.drain();
    const struck = this.tablets.reduce((sum, tablet) => sum + tablet.wire.struck.length, this.faults);
    return judgeRun(this.server.deps, this.tablets, {
      faults: struck,
      stuck: tries >= TRIES,
      broken: this.broken,
    });
  }

  private async round({ turns, event, passes }: Round): Promise<void> {
    // Nobody on one tablet waits for another's network.
    await Promise.all(turns.map((turn, n) => this.tap(this.tabletAt(n), turn)));
    await this.happen(event, () =>
      Promise.all(turns.map((turn, n) => this.exchange(this.tabletAt(n), turn))),
    );
    for (const tablet of this.tablets) await tablet.reopen();
    await this.lookAtAcknowledged();
    this.server.clock.now += passes;
  }

  /**
   * What the book acknowledged in this round is in it now. Not only at the end: a tablet may notice what was lost, and
   * send it again.
   */
  private async lookAtAcknowledged(): Promise<void> {
    const acknowledged: string[] = [];
    for (const tablet of this.tablets)
      for (const { entry } of await tablet.outbox.sentSince(0)) acknowledged.push(entry.id);
    const fresh = acknowledged.filter((id) => !this.acknowledged.has(id));
    for (const id of fresh) this.acknowledged.add(id);
    const rows = await this.server.deps.reads.query<{ id: string }[]>(
      `SELECT "id" FROM "entry" WHERE "id" IN (SELECT value FROM json_each(?))`,
      [JSON.stringify(fresh)],
    );
    const stored = new Set(rows.map(({ id }) => id));
    this.broken.push(...fresh.filter((id) => !stored.has(id)));
  }

  private tabletAt(n: number): FaultTablet {
    const tablet = this.tablets[n];
    if (!tablet) throw new Error(`There is no tablet ${n}.`);
    return tablet;
  }

  private async tap(tablet: FaultTablet, { author, taps, fault, place, jump }: Turn): Promise<void> {
    if (fault) this.faults++;
    const second = fault === 'two tabs' ? tablet.secondTab() : undefined;
    for (const [n, tap] of taps.entries()) {
      if (n === place) {
        if (fault === 'quota') tablet.harmNextPut('quota', 'outbox');
        if (fault === 'connection closed') tablet.closeConnections();
        if (fault === 'killed in mid-save') tablet.harmNextPut('killed', 'facts');
        if (fault === 'clock jumps') tablet.jump(jump);
        if (fault === 'asleep') tablet.sleep(10 * 60_000);
      }
      const by = tap.act === 'close shift' ? TEST_PEOPLE.foreman.id : (AUTHORS[author] ?? 'wanda');
      const saved = await tablet.log(by, this.draft(tablet, tap), n % 2 ? second : undefined);
      // What was not shown as saved, the person taps again.
      if (!saved) {
        await tablet.reopen();
        await tablet.log(by, this.draft(tablet, tap));
      }
      this.server.clock.now += 100;
    }
    if (fault === 'killed in mid-pull') tablet.harmNextPut('killed', 'entries', place);
  }

  private async exchange(tablet: FaultTablet, turn: Turn): Promise<void> {
    tablet.wire.cut = turn.offline;
    const second = turn.fault === 'two tabs' ? [tablet.exchange(tablet.secondTab())] : [];
    for (let tries = 0; tries < 2; tries++) if (await tablet.exchange()) break;
    await Promise.all(second);
    await tablet.wire.settled();
    tablet.wire.cut = false;
  }

  private draft(tablet: FaultTablet, { act, loom, of }: Tap): EntryDraft {
    const loomId = LOOMS[loom] ?? 'n1';
    const own = (kind: string) => tablet.shown.filter((one) => one.kind === kind);
    const others = this.tablets.filter((each) => each !== tablet).flatMap(({ shown }) => shown);
    const pick = <T>(from: readonly T[]): T | undefined => from[of % Math.max(1, from.length)];
    const stop: EntryDraft = { kind: 'stop', loomId, cause: of % 2 ? 'warp-break' : 'weft-break', count: 1 };
    switch (act) {
      case 'stop':
        return stop;
      case 'standing':
        return { kind: 'standing', loomId, cause: 'picking' };
      case 'resume': {
        const target = own('standing').at(-1);
        return target && 'loomId' in target && target.loomId
          ? { kind: 'resume', loomId: target.loomId, targetId: target.id }
          : stop;
      }
      case 'reading':
        return { kind: 'reading', loomId, shiftKey: testShiftKey(), boundary: 'end', value: of };
      case 'void own': {
        const target = pick(own('stop'));
        return target ? { kind: 'void', targetId: target.id, reason: 'Taken back' } : stop;
      }
      case 'amend own': {
        const target = pick(own('stop'));
        const change = { count: 2 + (of % 5) };
        return target ? { kind: 'amend', targetId: target.id, reason: 'More than one', change } : stop;
      }
      case 'void of another tablet': {
        const target = pick(others.filter((one) => one.kind === 'stop'));
        return target ? { kind: 'void', targetId: target.id, reason: 'Logged twice' } : stop;
      }
      case 'close shift':
        return { kind: 'close', shiftKey: testShiftKey() };
      case 'poison':
        return { ...stop, loomId: 'n99' };
    }
  }

  private async happen(event: ServerEvent | null, exchanges: () => Promise<unknown>): Promise<void> {
    if (event === 'restart in mid-push') {
      const pushed = this.server.nextPush();
      const going = exchanges();
      await Promise.race([pushed, going]);
      await this.server.restart();
      this.faults++;
      await going;
      return;
    }
    await this.before(event);
    await exchanges();
  }

  private async before(event: ServerEvent | null): Promise<void> {
    const { deps } = this.server;
    const changed = { disabled: event === 'author disabled' };
    switch (event) {
      case 'restart':
        await this.server.restart();
        break;
      case 'backup':
        await this.server.takeBackup();
        this.revokedInBackup = this.revoked;
        return;
      case 'restored backup':
      case 'copied file':
        if (!(await this.server.putBack(event))) return;
        this.revoked = this.revokedInBackup;
        break;
      case 'author disabled':
      case 'author enabled':
        await changePerson(deps, MANAGER_DESK, TEST_PEOPLE.weaver.id, changed);
        break;
      case 'tablet revoked':
        await revokeDevice(deps, MANAGER_DESK, tabletId(2));
        this.revoked = true;
        break;
      default:
        return;
    }
    this.faults++;
  }

  /** Everybody has network again, until nothing waits any more. How often that was tried. */
  private async drain(): Promise<number> {
    let done = 0;
    for (let tries = 0; tries < TRIES; tries++) {
      const well = await Promise.all(this.tablets.map((tablet) => tablet.exchange()));
      for (const tablet of this.tablets) {
        await tablet.wire.settled();
        await tablet.reopen();
      }
      this.server.clock.now += 60_000;
      const waiting = await Promise.all(this.tablets.map((tablet) => tablet.waiting()));
      const reached = well.every((one, n) => one || (n === 2 && this.revoked));
      done = reached && waiting.every((count) => count === 0) ? done + 1 : 0;
      // Once more: one tablet may have fetched before another had sent.
      if (done === 2) return tries;
    }
    return TRIES;
  }
}

/** Taps of one run. */
export const ENTRIES = 3 * 10 * TAPS;
