import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A photo of a repair. The picture itself lies in the data folder, under a name of the server's making. */
@Entity('photo')
export class PhotoRow {
  @PrimaryColumn({ type: 'text' }) id!: string;
  /** The `repair` entry that names it. */
  @Column({ type: 'text' }) repairId!: string;
  @Column({ type: 'text' }) shedId!: string;
  /** Its place among the repair's photos, from 0. */
  @Column({ type: 'integer' }) place!: number;
  @Column({ type: 'text', unique: true }) file!: string;
  @Column({ type: 'integer' }) width!: number;
  @Column({ type: 'integer' }) height!: number;
  @Column({ type: 'integer' }) bytes!: number;
  /** SHA-256 of what was sent, by which a second sending is known for the same. */
  @Column({ type: 'text' }) sentHash!: string;
  @Column({ type: 'text' }) deviceId!: string;
  @Column({ type: 'integer' }) receivedAt!: number;
}

/** A browser that is told of calls. */
@Entity('push_subscription')
export class PushSubscriptionRow {
  @PrimaryColumn({ type: 'text' }) endpoint!: string;
  @Column({ type: 'text' }) p256dh!: string;
  @Column({ type: 'text' }) auth!: string;
  @Column({ type: 'text' }) personId!: string;
  @Column({ type: 'text' }) deviceId!: string;
  /** With this sign-in it ends. */
  @Column({ type: 'text' }) sessionId!: string;
  @Column({ type: 'integer' }) since!: number;
}
