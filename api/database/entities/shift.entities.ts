import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A shift pattern, in the mill's local time. Patterns of one shed never overlap. */
@Entity('shift_pattern')
export class ShiftPatternRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) shedId!: string;
  @Column({ type: 'text' }) name!: string;
  /** Local HH:mm; an end not after the start lies on the next day. */
  @Column({ type: 'text' }) startsLocal!: string;
  @Column({ type: 'text' }) endsLocal!: string;
  /** ISO weekdays on which it starts, 1 Monday … 7 Sunday. */
  @Column({ type: 'simple-json' }) weekdays!: number[];
  @Column({ type: 'simple-json', nullable: true }) meal!: {
    startsLocal: string;
    endsLocal: string;
    looms: 'stopped' | 'running';
  } | null;
  /** The pattern that this one changes from a date on: shifts go by its id throughout. Null: it is the first. */
  @Column({ type: 'text', nullable: true }) rootId!: string | null;
  /** First date, and the first date on which it is no more; null: from the beginning, without end. */
  @Column({ type: 'text', nullable: true }) from!: string | null;
  @Column({ type: 'text', nullable: true }) until!: string | null;
}

/** What differs from the patterns on a date: a day off has no shift; a short day ends a pattern earlier. */
@Entity('calendar_day')
export class CalendarDayRow {
  @PrimaryColumn({ type: 'text' }) shedId!: string;
  @PrimaryColumn({ type: 'text' }) date!: string;
  /** `*`: all patterns of the day. */
  @PrimaryColumn({ type: 'text' }) patternId!: string;
  @Column({ type: 'text' }) kind!: 'off' | 'short' | 'overtime';
  @Column({ type: 'text', nullable: true }) startsLocal!: string | null;
  @Column({ type: 'text', nullable: true }) endsLocal!: string | null;
  @Column({ type: 'text' }) reason!: string;
}

/** A shift as a stored row; its instants are frozen when it is made. */
@Entity('shift')
export class ShiftRow {
  @PrimaryColumn({ type: 'text' }) key!: string;
  @Column({ type: 'text' }) shedId!: string;
  @Column({ type: 'text' }) date!: string;
  @Column({ type: 'text' }) patternId!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'integer' }) startsAt!: number;
  @Column({ type: 'integer' }) endsAt!: number;
  @Column({ type: 'integer', nullable: true }) mealStartsAt!: number | null;
  @Column({ type: 'integer', nullable: true }) mealEndsAt!: number | null;
  @Column({ type: 'text', nullable: true }) mealLooms!: 'stopped' | 'running' | null;
  @Column({ type: 'text' }) state!: 'open' | 'closed';
}

/** What was signed at a closing: kept for good, compared by a rebuild, never written by it. */
@Entity('signed_totals')
export class SignedTotalsRow {
  @PrimaryColumn({ type: 'text' }) shiftKey!: string;
  /** 1 at the first closing, one more at each later one. */
  @PrimaryColumn({ type: 'integer' }) version!: number;
  @Column({ type: 'integer' }) at!: number;
  @Column({ type: 'text' }) by!: string;
  /** The `close` (or `accept`) entry. */
  @Column({ type: 'text' }) entryId!: string;
  /** GroupFigures and each loom's LineTotals, as JSON. */
  @Column({ type: 'text' }) totals!: string;
  /** Version ids that the lines used. */
  @Column({ type: 'simple-json' }) versionIds!: string[];
}
