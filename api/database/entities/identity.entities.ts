import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { Role } from '../../../shared/contract/roles.js';

@Entity('person')
export class PersonRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text' }) shortName!: string;
  @Column({ type: 'text', nullable: true, unique: true }) worksNumber!: string | null;
  @Column({ type: 'text', nullable: true, unique: true }) email!: string | null;
  @Column({ type: 'text', nullable: true }) passwordHash!: string | null;
  @Column({ type: 'text', nullable: true }) pinHash!: string | null;
  /** Looms in walking order. */
  @Column({ type: 'simple-json' }) usualSet!: string[];
}

/** A person's rights from a moment; the latest is in force now, entries are judged by the one of their moment. */
@Entity('person_rights')
export class PersonRightsRow {
  @PrimaryColumn({ type: 'text' }) personId!: string;
  @PrimaryColumn({ type: 'integer' }) effectiveAt!: number;
  @Column({ type: 'simple-json' }) roles!: Role[];
  /** Sheds; empty: all. */
  @Column({ type: 'simple-json' }) shedIds!: string[];
  @Column({ type: 'boolean' }) disabled!: boolean;
}

@Entity('device')
export class DeviceRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) kind!: 'tablet' | 'browser';
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text', nullable: true }) shedId!: string | null;
  /** SHA-256 of the device cookie's secret; null for browsers. */
  @Column({ type: 'text', nullable: true }) secretHash!: string | null;
  @Column({ type: 'text', nullable: true }) registeredBy!: string | null;
  @Column({ type: 'integer' }) registeredAt!: number;
  @Column({ type: 'integer', nullable: true }) revokedAt!: number | null;
  @Column({ type: 'integer', nullable: true }) lastSeenAt!: number | null;
  @Column({ type: 'integer', nullable: true }) clockOffset!: number | null;
  @Column({ type: 'text', nullable: true }) appVersion!: string | null;
  /** How many entries waited on it when it last sent some. */
  @Column({ type: 'integer', nullable: true }) waiting!: number | null;
  /** Whether its browser has promised to keep its storage. */
  @Column({ type: 'boolean', nullable: true }) persisted!: boolean | null;
}

@Entity('session')
export class SessionRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) personId!: string;
  @Column({ type: 'text' }) deviceId!: string;
  @Column({ type: 'text' }) kind!: 'floor' | 'office';
  @Column({ type: 'integer' }) startedAt!: number;
  @Column({ type: 'integer' }) expiresAt!: number;
  @Column({ type: 'integer', nullable: true }) endedAt!: number | null;
  @Column({ type: 'text', nullable: true }) endedWhy!:
    'signed-out' | 'expired' | 'theft' | 'disabled' | 'device-revoked' | 'replaced' | null;
}

/** A refresh token retires when its successor, or that successor's access token, is first used. */
@Entity('refresh_token')
export class RefreshTokenRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) sessionId!: string;
  /** SHA-256 of the secret. */
  @Column({ type: 'text' }) secretHash!: string;
  @Column({ type: 'text', nullable: true }) parentId!: string | null;
  @Column({ type: 'integer' }) issuedAt!: number;
  @Column({ type: 'integer', nullable: true }) usedAt!: number | null;
  @Column({ type: 'integer', nullable: true }) retiredAt!: number | null;
}

@Entity('access_grant')
export class GrantRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) personId!: string;
  @Column({ type: 'text' }) deviceId!: string;
  @Column({ type: 'integer' }) issuedAt!: number;
}
