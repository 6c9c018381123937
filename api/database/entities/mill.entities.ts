import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { CauseVersion, ClothVersion, LoomVersion, Mill } from '../../../shared/contract/reference.js';

/** One row, `id` 1. */
@Entity('mill')
export class MillRow {
  @PrimaryColumn({ type: 'integer' }) id!: number;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text' }) timeZone!: string;
  @Column({ type: 'text' }) units!: Mill['units'];
  /** Who may see figures by person. */
  @Column({ type: 'text', default: 'own' }) figuresByPerson!: NonNullable<Mill['figuresByPerson']>;
  /** A shared tablet that nobody touches locks after so long. */
  @Column({ type: 'integer', default: 5 }) lockAfterMinutes!: number;
}

/** Facts about this database file: its `epoch`, the demo's seed. */
@Entity('meta')
export class MetaRow {
  @PrimaryColumn({ type: 'text' }) key!: string;
  @Column({ type: 'text' }) value!: string;
}

@Entity('shed')
export class ShedRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) name!: string;
}

@Entity('loom')
export class LoomRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) shedId!: string;
  @Column({ type: 'integer' }) number!: number;
  @Column({ type: 'integer' }) row!: number;
  @Column({ type: 'integer' }) position!: number;
  @Column({ type: 'text' }) alley!: string;
  /** In the shed from, until; ms since 1970. */
  @Column({ type: 'integer' }) from!: number;
  @Column({ type: 'integer', nullable: true }) until!: number | null;
}

@Entity('loom_version')
export class LoomVersionRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) loomId!: string;
  @Column({ type: 'integer' }) effectiveAt!: number;
  @Column({ type: 'real' }) ppm!: number;
  @Column({ type: 'real' }) reedSpaceCm!: number;
  @Column({ type: 'simple-json' }) clock!: LoomVersion['clock'];
  @Column({ type: 'integer' }) shuttles!: number;
  @Column({ type: 'boolean' }) battery!: boolean;
}

@Entity('cloth')
export class ClothRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) name!: string;
  /** No longer offered; what names it keeps its name. */
  @Column({ type: 'boolean', default: false }) retired!: boolean;
}

@Entity('cloth_version')
export class ClothVersionRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) clothId!: string;
  @Column({ type: 'integer' }) effectiveAt!: number;
  @Column({ type: 'integer' }) ends!: number;
  @Column({ type: 'real' }) picksPerCmOnLoom!: number;
  @Column({ type: 'real' }) picksPerCmLoomState!: number;
  @Column({ type: 'real' }) reedWidthCm!: number;
  @Column({ type: 'real' }) crimp!: number;
  @Column({ type: 'integer' }) abreast!: number;
  @Column({ type: 'simple-json' }) wefts!: ClothVersion['wefts'];
}

@Entity('warp')
export class WarpRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text' }) clothId!: string;
  @Column({ type: 'real' }) lengthM!: number;
  @Column({ type: 'real' }) thrumM!: number;
}

@Entity('cause_version')
export class CauseVersionRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) causeId!: string;
  @Column({ type: 'integer' }) effectiveAt!: number;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text' }) group!: CauseVersion['group'];
  @Column({ type: 'text' }) attendedBy!: CauseVersion['attendedBy'];
  @Column({ type: 'real', nullable: true }) allowanceS!: number | null;
  @Column({ type: 'text', nullable: true }) breakOf!: CauseVersion['breakOf'];
}
