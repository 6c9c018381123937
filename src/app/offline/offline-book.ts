import { Injectable, computed, inject } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { LIMITS } from '@shared/contract/limits';
import { inForceAt, type Loom, type LoomVersion, type Shift } from '@shared/contract/reference';
import type { Entry } from '@shared/entries/entry';
import type { Figures, LoomLine } from '@shared/entries/loom-line';
import { noInterval } from '@shared/figures/breaks';
import { lineFigures } from '@shared/figures/loom-line';
import { Clock } from '../core/clock';
import { newId } from '../core/ids';
import { SessionStore } from '../core/session-store';
import { NOT_YET } from './book-events';
import { BookSignals, sameItems } from './book-signals';
import type { OwnEntry } from './book-view';
import { stampDraft, type EntryDraft, type Stamp } from './entry-draft';
import { lastReadingOf, type LastReading } from './last-reading';
import { NotSaved } from './not-saved';
import { OfflineParts } from './offline-parts';
import { openCallOf, type OpenCall } from './open-call';
import { outboxItem, type OutboxItem } from './outbox-items';
import { syncStateOf } from './sync-state';

export interface OpenCallView extends OpenCall {
  /** How far it has come on its way to the book. */
  readonly state: OwnEntry['state'];
}

/** The book for screens: what this device knows of it, and the only way to write in it. */
@Injectable({ providedIn: 'root' })
export class OfflineBook {
  private readonly parts = inject(OfflineParts);
  private readonly session = inject(SessionStore);
  private readonly clock = inject(Clock);
  private readonly view = this.parts.view;

  private readonly signals = inject(BookSignals);
  private readonly status = toSignal(this.parts.loop.status$, { initialValue: NOT_YET });

  /** Why this device can keep nothing; null: it can. */
  readonly trouble = this.signals.trouble;
  /** False until what lies on this device is read. */
  readonly ready = this.signals.ready;
  readonly shedId = this.signals.shedId;
  readonly reference = this.signals.reference;
  readonly people = this.signals.people;
  /** The shed's looms as they stand: by row and place. */
  readonly looms = this.signals.looms;
  /** The causes in force, in the order in which the mill keeps them. */
  readonly causes = this.signals.causes;
  /** The shed's shifts that this device knows, oldest first. */
  readonly shifts = this.signals.shifts;
  readonly currentShift = this.signals.currentShift;
  readonly syncState = computed(() => {
    this.signals.outboxChanges();
    return syncStateOf(this.status(), this.view.outbox.values(), this.parts.photos());
  });
  /** Photos on this device that the book has not got. */
  readonly photos = this.parts.photos.asReadonly();
  /** Every waiting, held, refused or later entry, oldest first. */
  readonly items = computed<readonly OutboxItem[]>(() => {
    this.signals.outboxChanges();
    const reference = this.reference();
    return [...this.view.outbox.values()]
      .map((record) => outboxItem(record, reference))
      .filter((item) => item !== null)
      .sort((a, b) => a.at - b.at);
  });
  /** The looms that whoever is here minds in the current shift, in walking order. */
  readonly mySet = computed<readonly Loom[]>(
    () => this.setOf(this.session.person()?.id ?? null, this.currentShift()),
    { equal: sameItems },
  );
  /** The shed's lines of the current shift. Only touched looms are projected again. */
  readonly lines = computed<ReadonlyMap<string, LoomLine>>(() => {
    const shift = this.currentShift();
    if (!shift) return new Map();
    return new Map(this.looms().map((loom) => [loom.id, this.signals.line(loom.id, shift)]));
  });

  /** Resolves when what lies on this device is read. */
  whenReady(): Promise<void> {
    return this.parts.start();
  }

  /** At an office browser: which shed is shown. A tablet's is its own. */
  chooseShed(id: string): void {
    this.parts.shed.set(id);
  }

  // ── writing ──────────────────────────────────────────────────────────────────────────────────────────────────

  /** Resolves when the entry is on this device's disk; throws `NotSaved`, with a sentence to show, when it is not. */
  async log(draft: EntryDraft): Promise<Entry> {
    const [entry] = await this.write([draft], undefined);
    if (!entry) throw new NotSaved('storage-closed');
    return entry;
  }

  /** Entries of one act: all are on disk or none, under one `batchId`, which one void takes back. */
  logAll(drafts: readonly EntryDraft[]): Promise<Entry[]> {
    return drafts.length ? this.write(drafts, newId()) : Promise.resolve([]);
  }

  /** Takes an entry back: by a `void`, never by removing it. */
  undo(id: string, reason = 'Taken back'): Promise<Entry> {
    const basedOn = this.view.latestCorrection(id);
    return this.log({
      kind: 'void',
      targetId: id,
      reason,
      ...(basedOn !== null && { basedOn }),
      ...this.shedOf(id),
    });
  }

  /** Takes back all entries of one act. */
  undoBatch(batchId: string, reason = 'Taken back'): Promise<Entry> {
    return this.log({ kind: 'void', targetBatchId: batchId, reason });
  }

  /** What a correction of an entry is based on; undefined: nothing corrects it. */
  basedOn(id: string): string | undefined {
    return this.view.latestCorrection(id) ?? undefined;
  }

  // ── one loom ─────────────────────────────────────────────────────────────────────────────────────────────────

  /** The loom's line in a shift (the current one unless said). Call it inside `computed`. */
  lineOf(loomId: string, shift: Shift | null = this.currentShift()): LoomLine | null {
    return shift ? this.signals.line(loomId, shift) : null;
  }

  /** Its figures as of now (corrected, to ten seconds). */
  figuresOf(loomId: string, shift: Shift | null = this.currentShift()): Figures | null {
    const line = this.lineOf(loomId, shift);
    return line && lineFigures(line, this.clock.tick(), noInterval);
  }

  /** The latest effective reading of the loom up to now: what a new one is held against. */
  lastReading(loomId: string, shift: Shift | null = this.currentShift()): LastReading | null {
    this.signals.loomChanges(loomId);
    return shift && lastReadingOf(this.view.resolvedOf(loomId, shift));
  }

  /** The causes of the loom's stops by what this device knows, the commonest first. */
  commonCauses(loomId: string): readonly string[] {
    this.signals.loomChanges(loomId);
    return this.view.causesOf(loomId);
  }

  /** How many entries about the loom the book has not acknowledged. */
  notSent(loomId: string): number {
    this.signals.outboxChanges();
    return this.view.notSent(loomId);
  }

  /** What whoever is here logged of the loom in the shift, newest first. */
  recentOf(loomId: string, shift: Shift | null = this.currentShift()): readonly OwnEntry[] {
    this.signals.loomChanges(loomId);
    const author = this.session.person()?.id;
    return author && shift ? this.view.ownOf(loomId, author, shift.startsAt - SHIFT_EDGE) : [];
  }

  /** The loom's call for the tackler that is not done with, and how far it has come. */
  openCall(loomId: string, shift: Shift | null = this.currentShift()): OpenCallView | null {
    const line = this.lineOf(loomId, shift);
    if (!line || !shift) return null;
    this.signals.outboxChanges();
    const open = new Set(line.stops.filter((stop) => stop.timed && stop.until === null).map(({ id }) => id));
    const call = openCallOf(this.view.resolvedOf(loomId, shift), open);
    return call && { ...call, state: this.view.stateOf(call.id) };
  }

  /** The looms that a person minds in a shift, in walking order. */
  setOf(personId: string | null, shift: Shift | null): readonly Loom[] {
    this.signals.assignChanges();
    if (!shift || personId === null) return [];
    const taken = [...this.view.assignments(shift)].filter(([, { weaverId }]) => weaverId === personId);
    const place = new Map(taken.map(([loomId], index) => [loomId, index]));
    // Who chose the looms said the walk with them; who was given looms walks as usual.
    const given = taken.some(([, { by }]) => by !== personId);
    const usual = given ? (this.people().find((person) => person.id === personId)?.usualSet ?? []) : [];
    const order = (id: string) =>
      usual.includes(id) ? usual.indexOf(id) : usual.length + (place.get(id) ?? 0);
    return this.looms()
      .filter((loom) => place.has(loom.id))
      .sort((a, b) => order(a.id) - order(b.id));
  }

  /** Who minds the loom in a shift by what this device knows; null: nobody. */
  weaverOf(loomId: string, shift: Shift | null = this.currentShift()): string | null {
    this.signals.loomChanges(loomId);
    return shift ? (this.view.assignments(shift).get(loomId)?.weaverId ?? null) : null;
  }

  /** Speed and clock in force on the loom now. */
  loomVersionOf(loomId: string): LoomVersion | null {
    const versions = this.reference().loomVersions.filter((version) => version.loomId === loomId);
    return inForceAt(versions, this.clock.tick()) ?? null;
  }

  // ── the header's list ────────────────────────────────────────────────────────────────────────────────────────

  /** Tries now, whatever the back-off says. */
  retryNow(): void {
    this.parts.insist();
  }

  /** Everything that is not in the book as a JSON file; what is in it counts as exported once this resolves. */
  exportWaiting(): Promise<Blob> {
    return this.parts.exportOutbox();
  }

  /** Drops a refused entry from this device, only after it was exported. Says whether it is gone. */
  dismissRefused(id: string): Promise<boolean> {
    return this.parts.dismiss(id);
  }

  // ─────────────────────────────────────────────────────────────────────────────────────────────────────────────

  private async write(drafts: readonly EntryDraft[], batchId: string | undefined): Promise<Entry[]> {
    const stamp = this.stamp(batchId);
    const records = await this.parts.append(drafts.map((draft) => stampDraft(draft, stamp)));
    return records.map((record) => record.entry);
  }

  private stamp(batchId: string | undefined): Stamp {
    const grant = this.session.grant();
    const person = this.session.person();
    if (!grant || !person) throw new NotSaved('nobody');
    const shedId = this.shedId();
    if (shedId === null) throw new NotSaved('no-shed');
    const measure = this.clock.measure;
    return {
      shedId,
      by: person.id,
      grantId: grant.id,
      deviceId: grant.deviceId,
      now: this.clock.now(),
      clock: measure ? { offset: measure.offset, measuredAt: measure.measuredAt } : undefined,
      newId,
      steppedSince: (at) => this.clock.steppedSince(at),
      ...(batchId !== undefined && { batchId }),
    };
  }

  /** A correction belongs to its target's shed. */
  private shedOf(id: string): { shedId?: string } {
    const target = this.view.entry(id);
    return target ? { shedId: target.shedId } : {};
  }
}

/** Entries up to this long before the shift, e.g. a taking-over a little early, stand in its lists. */
const SHIFT_EDGE = LIMITS.readingOffBoundary * 6;
