import { schemaOf, type Entry } from '../../shared/entries/entry.js';
import { LIMITS } from '../../shared/contract/limits.js';
import { DEMO_SHED } from './mill.js';
import type { Random } from './random.js';

type Stamped =
  'id' | 'schema' | 'shedId' | 'by' | 'grantId' | 'deviceId' | 'deviceSeq' | 'recordedAt' | 'source';
type Unstamped<E> = E extends Entry ? Omit<E, Stamped> : never;
/** An entry as its author thinks of it, before the device stamps it. */
export type Said = Unstamped<Entry>;

export const DEMO_DEVICES = [
  { id: 'demo-tablet-a', kind: 'tablet', name: 'Alley A' },
  { id: 'demo-tablet-b', kind: 'tablet', name: 'Alley B' },
  { id: 'demo-office', kind: 'browser', name: 'Shed office' },
] as const;
export type DemoDevice = (typeof DEMO_DEVICES)[number]['id'];

export function demoGrantId(personId: string, deviceId: string): string {
  return `${personId}.${deviceId}`;
}

/** What a device hands in at once. */
export interface DemoPush {
  readonly deviceId: DemoDevice;
  readonly sentAt: number;
  readonly entries: readonly Entry[];
}

interface Kept {
  entry: Entry;
  deviceId: DemoDevice;
  sentAt: number;
}

/** Collects what people log, stamps it as a tablet would, and hands it over in pushes in the order of sending. */
export class Daybook {
  private readonly kept: Kept[] = [];

  constructor(
    private readonly random: Random,
    /** Nothing is logged after this moment. */
    private readonly now: number,
  ) {}

  /** Logs at a moment; `sentAt`: when the device reaches the server. Answers the entry's id. */
  log(by: string, deviceId: DemoDevice, recordedAt: number, said: Said, sentAt: number): string {
    const at = Math.round(recordedAt);
    const id = this.random.uuidV7(at);
    if (at <= this.now)
      this.kept.push({
        deviceId,
        sentAt: Math.max(sentAt, at),
        entry: {
          ...said,
          id,
          schema: schemaOf(said.kind, said),
          shedId: DEMO_SHED,
          by,
          grantId: demoGrantId(by, deviceId),
          deviceId,
          deviceSeq: 1,
          recordedAt: at,
          source: 'tap',
        },
      });
    return id;
  }

  newBatchId(at: number): string {
    return this.random.uuidV7(at);
  }

  /** All pushes; a device numbers its entries in the order in which they were tapped. */
  pushes(): DemoPush[] {
    const pushes: DemoPush[] = [];
    for (const { id: deviceId } of DEMO_DEVICES) {
      const own = this.kept.filter((k) => k.deviceId === deviceId);
      own.sort((a, b) => a.entry.recordedAt - b.entry.recordedAt);
      own.forEach((k, i) => (k.entry = { ...k.entry, deviceSeq: i + 1 }));
      const bySending = new Map<number, Entry[]>();
      for (const { entry, sentAt } of own) {
        const sending = Math.min(sentAt, this.now);
        const list = bySending.get(sending);
        if (list) list.push(entry);
        else bySending.set(sending, [entry]);
      }
      for (const [sentAt, entries] of bySending)
        for (let i = 0; i < entries.length; i += LIMITS.entriesPerPush)
          pushes.push({ deviceId, sentAt, entries: entries.slice(i, i + LIMITS.entriesPerPush) });
    }
    // A tablet before the office at the same moment: the foreman closes what has arrived.
    return pushes.sort((a, b) => a.sentAt - b.sentAt);
  }
}
