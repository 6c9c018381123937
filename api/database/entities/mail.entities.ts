import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { MailForm } from '../../../shared/contract/set-up.js';

/** One row, `id` 1; none until mail is set up. */
@Entity('mail_settings')
export class MailSettingsRow {
  @PrimaryColumn({ type: 'integer' }) id!: number;
  /** Null: no server. */
  @Column({ type: 'text', nullable: true }) host!: string | null;
  @Column({ type: 'integer' }) port!: number;
  @Column({ type: 'text' }) security!: MailForm['security'];
  @Column({ type: 'text' }) user!: string;
  /** As it has to be said to the mail server: it cannot be hashed. Never leaves this server otherwise. */
  @Column({ type: 'text', nullable: true }) password!: string | null;
  @Column({ type: 'text' }) from!: string;
  /** Under which address a manager last worked here: links in letters begin with it. */
  @Column({ type: 'text', nullable: true }) baseUrl!: string | null;
}

/** A letter that is to go out, went out, or lies in the data folder. */
@Entity('letter')
export class LetterRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  @Column({ type: 'text' }) purpose!: 'invite' | 'reset' | 'test';
  @Column({ type: 'text' }) to!: string;
  @Column({ type: 'text' }) subject!: string;
  /** Null once it was sent: what it said, one-time links too, is nobody's business any more. */
  @Column({ type: 'text', nullable: true }) text!: string | null;
  @Column({ type: 'text', nullable: true }) html!: string | null;
  @Column({ type: 'integer' }) at!: number;
  @Column({ type: 'text' }) state!: 'waiting' | 'sent' | 'failed' | 'kept';
  @Column({ type: 'integer' }) tries!: number;
  /** When the next try is due; null: none is. */
  @Column({ type: 'integer', nullable: true }) dueAt!: number | null;
  /** After this moment it is worth nothing: its link has run out. */
  @Column({ type: 'integer', nullable: true }) until!: number | null;
  /** Why the last try came to nothing, for a person. */
  @Column({ type: 'text', nullable: true }) trouble!: string | null;
}

/** A link by which one person chooses a password, once. */
@Entity('one_time_link')
export class OneTimeLinkRow {
  /** SHA-256 of the token: the token itself is in the letter alone. */
  @PrimaryColumn({ type: 'text' }) tokenHash!: string;
  @Column({ type: 'text' }) personId!: string;
  @Column({ type: 'text' }) purpose!: 'invite' | 'reset';
  @Column({ type: 'integer' }) madeAt!: number;
  @Column({ type: 'integer' }) expiresAt!: number;
  @Column({ type: 'integer', nullable: true }) usedAt!: number | null;
  /** A newer link, or the end of the person's rights, took its place. */
  @Column({ type: 'integer', nullable: true }) voidedAt!: number | null;
}

/** A code that makes one browser a tablet, once. */
@Entity('tablet_code')
export class TabletCodeRow {
  /** SHA-256 of the code. */
  @PrimaryColumn({ type: 'text' }) codeHash!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text' }) shedId!: string;
  @Column({ type: 'text' }) by!: string;
  @Column({ type: 'integer' }) madeAt!: number;
  @Column({ type: 'integer' }) expiresAt!: number;
  @Column({ type: 'integer', nullable: true }) usedAt!: number | null;
}
