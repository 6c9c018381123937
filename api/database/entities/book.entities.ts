import { Column, Entity, PrimaryColumn, PrimaryGeneratedColumn } from 'typeorm';
import type { HoldReason } from '../../../shared/contract/errors.js';
import type { EntryKind } from '../../../shared/entries/entry.js';

/** The book: append-only. What the server fixed at first acceptance stands beside the entry's original JSON. */
@Entity('entry')
export class EntryRow {
  @PrimaryGeneratedColumn({ type: 'integer' }) seq!: number;
  @Column({ type: 'text', unique: true }) id!: string;
  @Column({ type: 'text' }) kind!: EntryKind;
  @Column({ type: 'text' }) shedId!: string;
  /** Corrected moment, corrected `until`, corrected moment in an amendment's change. */
  @Column({ type: 'integer' }) at!: number;
  @Column({ type: 'integer', nullable: true }) until!: number | null;
  @Column({ type: 'integer', nullable: true }) changedAt!: number | null;
  @Column({ type: 'text', nullable: true }) shiftKey!: string | null;
  @Column({ type: 'text', nullable: true }) targetId!: string | null;
  @Column({ type: 'text', nullable: true }) targetBatchId!: string | null;
  @Column({ type: 'text', nullable: true }) batchId!: string | null;
  @Column({ type: 'text' }) by!: string;
  @Column({ type: 'text' }) deviceId!: string;
  @Column({ type: 'integer' }) deviceSeq!: number;
  @Column({ type: 'integer' }) receivedAt!: number;
  /** As it was sent, to the letter of its meaning (canonical JSON). */
  @Column({ type: 'text' }) body!: string;
}

/** Which looms an entry is about (a correction: its target's looms), for finding a line's entries. */
@Entity('entry_loom')
export class EntryLoomRow {
  @PrimaryColumn({ type: 'text' }) loomId!: string;
  @PrimaryColumn({ type: 'integer' }) seq!: number;
  @Column({ type: 'integer' }) at!: number;
  @Column({ type: 'text', nullable: true }) shiftKey!: string | null;
}

/** Why an entry waits, per shift (`*`: whatever the shift), and what the foreman decided. */
@Entity('entry_hold')
export class EntryHoldRow {
  @PrimaryColumn({ type: 'text' }) entryId!: string;
  @PrimaryColumn({ type: 'text' }) shiftKey!: string;
  @Column({ type: 'text' }) reason!: HoldReason;
  @Column({ type: 'text' }) state!: 'held' | 'accepted' | 'refused';
  @Column({ type: 'text', nullable: true }) decidedBy!: string | null;
}

/** Read model: timed stops as intervals, by which a shift's overlapping stops are found. */
@Entity('stand')
export class StandRow {
  @PrimaryColumn({ type: 'text' }) stopId!: string;
  @PrimaryColumn({ type: 'text' }) loomId!: string;
  @Column({ type: 'text' }) shedId!: string;
  @Column({ type: 'integer' }) from!: number;
  @Column({ type: 'integer', nullable: true }) until!: number | null;
  @Column({ type: 'text' }) cause!: string;
}

/** Read model: what is on a loom from a moment, from `warp-change` entries. */
@Entity('fitting')
export class FittingRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) loomId!: string;
  @Column({ type: 'integer' }) effectiveAt!: number;
  @Column({ type: 'text', nullable: true }) warpId!: string | null;
  @Column({ type: 'text' }) clothId!: string;
  @Column({ type: 'text' }) how!: 'gaiting' | 'knotting' | 'as-found';
}

/** Read model: one loom in one shift. `line` is the LoomLine, the columns are its LineTotals at the shift's end. */
@Entity('loom_line')
export class LoomLineRow {
  @PrimaryColumn({ type: 'text' }) shiftKey!: string;
  @PrimaryColumn({ type: 'text' }) loomId!: string;
  @Column({ type: 'text' }) shedId!: string;
  /** The shift's date, and the Monday of its ISO week. */
  @Column({ type: 'text' }) date!: string;
  @Column({ type: 'text' }) week!: string;
  @Column({ type: 'integer' }) row!: number;
  @Column({ type: 'text', nullable: true }) clothId!: string | null;
  @Column({ type: 'text' }) picksBy!: 'readings' | 'agreed' | 'sheet' | 'none';
  @Column({ type: 'real' }) minutes!: number;
  @Column({ type: 'real' }) plannedMinutes!: number;
  @Column({ type: 'real' }) shedStopMinutes!: number;
  @Column({ type: 'real' }) stopMinutes!: number;
  @Column({ type: 'real' }) measuredMinutes!: number;
  @Column({ type: 'real' }) estimatedMinutes!: number;
  @Column({ type: 'real', nullable: true }) possiblePicks!: number | null;
  @Column({ type: 'real', nullable: true }) possibleScheduled!: number | null;
  @Column({ type: 'real', nullable: true }) possibleLessShed!: number | null;
  @Column({ type: 'real', nullable: true }) measuredPicks!: number | null;
  @Column({ type: 'real', nullable: true }) estimatedPicks!: number | null;
  @Column({ type: 'real', nullable: true }) picks!: number | null;
  @Column({ type: 'real', nullable: true }) weavingMinutes!: number | null;
  @Column({ type: 'real', nullable: true }) pickEnds!: number | null;
  @Column({ type: 'integer' }) warpBreaks!: number;
  @Column({ type: 'integer' }) weftBreaks!: number;
  @Column({ type: 'integer' }) stops!: number;
  @Column({ type: 'integer' }) perns!: number;
  @Column({ type: 'integer' }) flagCount!: number;
  /** 1: it stands in its group's ratios (`isCounted`). */
  @Column({ type: 'integer' }) counted!: number;
  /** JSON of LineTotals.minutesByCause. */
  @Column({ type: 'text' }) minutesByCause!: string;
  /** JSON of the LoomLine. */
  @Column({ type: 'text' }) line!: string;
}

/** Numbers everything that a device may see; a pull is "after this number". */
@Entity('change')
export class ChangeRow {
  @PrimaryGeneratedColumn({ type: 'integer' }) seq!: number;
  /** The shed it concerns; null: the whole mill (reference data, people). */
  @Column({ type: 'text', nullable: true }) shedId!: string | null;
  @Column({ type: 'text' }) kind!: 'entry' | 'shift' | 'fitting' | 'reference' | 'people';
  /** The entry's id, the shift's key, the loom's id (fitting), or '' for whole tables. */
  @Column({ type: 'text' }) ref!: string;
  /** Chance: what a cursor names beside the number. Null: from before there were marks; then `ref` is named. */
  @Column({ type: 'text', nullable: true }) mark!: string | null;
}
