import { Column, Entity, PrimaryColumn, PrimaryGeneratedColumn } from 'typeorm';
import type { RecordedChange } from '../../../shared/contract/set-up.js';

/** The passage between two rows with the tacklers who serve it. Looms name it by `alley`. */
@Entity('alley')
export class AlleyRow {
  @PrimaryColumn({ type: 'text' }) shedId!: string;
  @PrimaryColumn({ type: 'text' }) name!: string;
  @Column({ type: 'simple-json' }) tacklerIds!: string[];
}

/** What a cloth's looms should reach from a moment on: a share, breaks per 10⁵ picks; null: no target. */
@Entity('target')
export class TargetRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) clothId!: string;
  @Column({ type: 'integer' }) effectiveAt!: number;
  @Column({ type: 'real', nullable: true }) efficiency!: number | null;
  @Column({ type: 'real', nullable: true }) warpBreaks!: number | null;
  @Column({ type: 'real', nullable: true }) weftBreaks!: number | null;
}

/** A spare part, as repairs name it. */
@Entity('part')
export class PartRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'boolean', default: false }) retired!: boolean;
}

/** A job of care that is due again after so many picks. */
@Entity('job')
export class JobRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'integer' }) everyPicks!: number;
  @Column({ type: 'boolean', default: false }) retired!: boolean;
}

/** The record of what was changed in set-up. Append-only: triggers refuse to update or delete a row. */
@Entity('recorded_change')
export class RecordedChangeRow {
  @PrimaryGeneratedColumn({ type: 'integer' }) seq!: number;
  @Column({ type: 'integer' }) at!: number;
  @Column({ type: 'text', nullable: true }) by!: string | null;
  /** The person's name at that moment. */
  @Column({ type: 'text' }) byName!: string;
  @Column({ type: 'text' }) what!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text' }) action!: RecordedChange['action'];
  @Column({ type: 'integer', nullable: true }) effectiveAt!: number | null;
  /** JSON of the fields as they were and as they are. */
  @Column({ type: 'text', nullable: true }) before!: string | null;
  @Column({ type: 'text', nullable: true }) after!: string | null;
  @Column({ type: 'text', nullable: true }) reason!: string | null;
}
