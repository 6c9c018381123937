import type { DeviceRow as DeviceOnWire } from '../../../shared/contract/session.js';
import type { DeviceRow } from '../../database/entities/index.js';

/** `sequence`: what is stored of the device's own numbering; absent: nothing came from it yet. */
export function toDevice(
  row: DeviceRow,
  sequence: { readonly lastSeq: number; readonly stored: number } | undefined,
): DeviceOnWire {
  return {
    id: row.id,
    kind: row.kind,
    name: row.name,
    shedId: row.shedId,
    revoked: row.revokedAt !== null,
    registeredAt: row.registeredAt,
    revokedAt: row.revokedAt,
    lastSeenAt: row.lastSeenAt,
    clockOffset: row.clockOffset,
    appVersion: row.appVersion,
    waiting: row.waiting,
    persisted: row.persisted,
    lastSeq: sequence?.lastSeq ?? 0,
    gaps: sequence ? sequence.lastSeq - sequence.stored : 0,
  };
}
