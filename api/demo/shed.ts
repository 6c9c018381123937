import type { Shift, Warp } from '../../shared/contract/reference.js';
import { Agenda } from './agenda.js';
import type { Daybook, DemoDevice, Said } from './daybook.js';
import type { DemoMill } from './mill.js';
import type { Random } from './random.js';
import { mendByTackler, type TacklerCall } from './tackling.js';
import { changeWarp } from './warp-room.js';
import {
  DRIFTING,
  HOUR,
  MINUTE,
  newLooms,
  nextTrouble,
  SECOND,
  weaveUntil,
  WEEK,
  type LoomState,
  type Trouble,
} from './weaving.js';
import { sure } from './sure.js';

/** Who works a shift: a weaver to each set, a tackler, a foreman. Person ids. */
export interface Crew {
  readonly weavers: readonly string[];
  readonly tackler: string;
  readonly foreman: string;
}

interface Weaver {
  busy: boolean;
  /** Looms that stand and wait, the one that has waited longest first. */
  readonly waiting: { loom: LoomState; trouble: Trouble; since: number }[];
}

/**
 * The shed as it runs: looms stop by chance and by what runs out, one weaver minds six (so that looms wait for each
 * other), one tackler minds all. What people log of it goes to the daybook; what they forget, does not.
 */
export class Shed {
  readonly agenda = new Agenda();
  readonly looms: readonly LoomState[];
  readonly warps: Warp[] = [];
  readonly calls: TacklerCall[] = [];
  tacklerBusy = false;
  private readonly weavers: Weaver[];
  private powerBackAt = 0;
  private onShift: { shift: Shift; crew: Crew } | null = null;

  constructor(
    readonly mill: DemoMill,
    readonly random: Random,
    readonly daybook: Daybook,
    readonly now: number,
  ) {
    this.looms = newLooms(mill, random);
    this.weavers = [0, 1, 2, 3].map(() => ({ busy: false, waiting: [] }));
  }

  get crew(): Crew {
    if (!this.onShift) throw new Error('Nobody is at work.');
    return this.onShift.crew;
  }

  begin(shift: Shift, crew: Crew): void {
    this.onShift = { shift, crew };
  }

  tabletOf(loom: LoomState): DemoDevice {
    return loom.number <= 12 ? 'demo-tablet-a' : 'demo-tablet-b';
  }

  /** A tablet reaches the server at the end of each shift at the latest: here, then. */
  say(by: string, loom: LoomState, at: number, said: Said): string {
    return this.daybook.log(by, this.tabletOf(loom), at, said, this.sendingAt);
  }

  get sendingAt(): number {
    return (this.onShift?.shift.endsAt ?? 0) + 4 * MINUTE;
  }

  /** The loom runs from `at`, or from when the power is back. */
  start(loom: LoomState, at: number): void {
    if (at < this.powerBackAt) {
      this.agenda.schedule(this.powerBackAt, (later) => this.start(loom, later));
      return;
    }
    loom.running = true;
    loom.since = at;
    this.expectTrouble(loom, at);
  }

  halt(loom: LoomState, at: number): void {
    weaveUntil(loom, at);
    loom.running = false;
    loom.turn++;
  }

  /** Draws anew what will stop it: at a start, and when its luck changes with the shift. */
  expectTrouble(loom: LoomState, at: number): void {
    const turn = ++loom.turn;
    const cloth = this.mill.clothVersions.find((version) => version.clothId === loom.clothId);
    const weeksAgo = (this.now - at) / WEEK;
    const { after, trouble } = nextTrouble(loom, cloth?.ends ?? 2_600, weeksAgo, this.random);
    this.agenda.schedule(at + after, (then) => {
      if (loom.turn !== turn) return;
      this.halt(loom, then);
      sure(this.weavers[loom.set]).waiting.push({ loom, trouble, since: then });
      this.walk(loom.set, then);
    });
  }

  /** The weaver goes to the loom that has waited longest, if free. */
  private walk(set: number, at: number): void {
    const weaver = sure(this.weavers[set]);
    if (weaver.busy) return;
    const next = weaver.waiting.shift();
    if (!next) return;
    weaver.busy = true;
    const arrives = at + this.random.duration(6 * SECOND, 0.5);
    this.agenda.schedule(arrives, (here) => {
      const free = this.attend(next.loom, next.trouble, here);
      this.agenda.schedule(free, (then) => {
        weaver.busy = false;
        this.walk(set, then);
      });
    });
  }

  /** What the weaver does at the loom from `at`; answers when the weaver is free again. */
  private attend(loom: LoomState, trouble: Trouble, at: number): number {
    const { random } = this;
    const weaver = sure(this.crew.weavers[loom.set]);
    switch (trouble) {
      case 'pern': {
        loom.perns++;
        loom.picksToPern = this.picksPerPern(loom) * random.between(0.93, 1.03);
        return this.mendedAt(loom, at + random.duration(12 * SECOND, 0.3));
      }
      case 'warp': {
        if (random.chance(0.02)) return this.smash(loom, weaver, at);
        const cause = random.chance(0.08) ? 'slack-end' : 'warp-break';
        return this.mendAndTap(loom, weaver, cause, at + random.duration(55 * SECOND, 0.5));
      }
      case 'weft': {
        const cause = random.chance(0.1) ? 'mispick' : 'weft-break';
        return this.mendAndTap(loom, weaver, cause, at + random.duration(27 * SECOND, 0.4));
      }
      case 'cut': {
        loom.picksToCut = random.between(120_000, 170_000);
        return this.mendAndTap(loom, weaver, 'cut-off', at + random.duration(170 * SECOND, 0.2));
      }
      case 'fault':
        return mendByTackler(this, loom, weaver, at);
      case 'warp-out':
        return changeWarp(this, loom, weaver, at, !DRIFTING.includes(loom.number));
    }
  }

  private mendAndTap(loom: LoomState, weaver: string, cause: string, mended: number): number {
    // A busy weaver forgets a tap now and then: the minutes stay unaccounted for.
    const forgotten = this.random.chance(0.03);
    this.agenda.schedule(mended, (then) => {
      const at = Math.round(then);
      if (!forgotten) this.say(weaver, loom, at, { kind: 'stop', loomId: loom.id, at, cause, count: 1 });
      this.start(loom, then);
    });
    return mended;
  }

  private mendedAt(loom: LoomState, at: number): number {
    this.agenda.schedule(at, (then) => this.start(loom, then));
    return at;
  }

  private smash(loom: LoomState, weaver: string, at: number): number {
    this.stand(loom, weaver, 'smash', at, this.random.duration(26 * MINUTE, 0.4));
    return at + 90 * SECOND;
  }

  /** Logs a timed stop from `at` for `length`, after which it runs. */
  stand(loom: LoomState, by: string, cause: string, at: number, length: number): void {
    const stopId = this.say(by, loom, at, { kind: 'standing', loomId: loom.id, at: Math.round(at), cause });
    this.agenda.schedule(at + length, (then) => {
      this.resume(loom, by, stopId, then);
    });
  }

  /** "Running": logged and true. */
  resume(loom: LoomState, by: string, stopId: string, at: number): void {
    this.say(by, loom, at, { kind: 'resume', loomId: loom.id, at: Math.round(at), targetId: stopId });
    this.start(loom, at);
  }

  /** Someone stops a running loom on purpose; if it stands just then, a little later. */
  standOnPurpose(loom: LoomState, by: string, cause: string, at: number, length: number): void {
    this.agenda.schedule(at, (then) => {
      if (!loom.running) {
        if (then < at + 2 * HOUR) this.standOnPurpose(loom, by, cause, then + 4 * MINUTE, length);
        return;
      }
      this.halt(loom, then);
      this.stand(loom, by, cause, then, length);
    });
  }

  /** The power fails for all: one shed stop, known with both ends when it is logged. */
  powerCut(at: number, length: number): void {
    this.agenda.schedule(at, (then) => {
      this.powerBackAt = then + length;
      for (const loom of this.looms)
        if (loom.running) {
          this.halt(loom, then);
          this.start(loom, then);
        }
      const from = Math.round(then);
      const until = Math.round(then + length);
      this.daybook.log(
        this.crew.foreman,
        'demo-tablet-a',
        until + MINUTE,
        { kind: 'shed-stop', at: from, until, cause: 'power', scope: { of: 'shed' } },
        this.sendingAt,
      );
    });
  }

  /** Nothing moves from `from` to `until`: a meal with looms stopped, a weekend. */
  pause(from: number, until: number): void {
    for (const loom of this.looms) {
      weaveUntil(loom, from);
      loom.since = until;
    }
    this.agenda.postpone(until - from);
  }

  picksPerPern(loom: LoomState): number {
    const cloth = this.mill.clothVersions.find((version) => version.clothId === loom.clothId);
    const weft = sure(cloth?.wefts[0]);
    return (weft.pernMassG * 1_000) / weft.tex / ((sure(cloth).reedWidthCm / 100) * (1 + weft.waste));
  }
}
