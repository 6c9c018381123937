import type { EntityManager } from 'typeorm';
import type { Changed } from '../../../shared/contract/set-up.js';
import { ShedRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';
import { ChangeLog } from '../book/change-log.js';
import { remakeLines } from '../book/remade-lines.js';
import { differingFields, recordChanges, type ChangeToRecord } from '../change-record/record-change.js';

/** Before all that the book takes (2000-01-01): what is first said of a thing holds from the beginning. */
export const ALWAYS = 946_684_800_000;

/** One change of set-up, inside the writer's transaction: what it touches is told to it, and is seen to at the end. */
export class SetUpChange {
  /** What tablets are told beside the reference data. */
  readonly changes = new ChangeLog();
  /** From when on open shifts are to be projected again, by shed. */
  private readonly remade = new Map<string, number>();
  private readonly recorded: ChangeToRecord[] = [];

  constructor(
    readonly tx: EntityManager,
    readonly principal: Principal,
    readonly now: number,
  ) {}

  /** Appends to the record of changes, by whoever asks. */
  record(change: Omit<ChangeToRecord, 'by' | 'at'>): void {
    this.recorded.push({ ...change, by: this.principal.person?.id ?? null, at: this.now });
  }

  /** Records what differs between two states of a thing; false: nothing does. */
  recordDifference(
    what: string,
    name: string,
    before: object,
    after: object,
    more: Pick<ChangeToRecord, 'effectiveAt' | 'reason'> = {},
  ): boolean {
    const fields = differingFields(before, after);
    const differs = Object.keys(fields.after).length + Object.keys(fields.before).length > 0;
    if (differs) this.record({ what, name, action: 'changed', ...fields, ...more });
    return differs;
  }

  /** Open shifts of a shed (null: of all) that reach past a moment are projected again; closed ones stay as signed. */
  async remakeFrom(shedId: string | null, from: number): Promise<void> {
    const sheds = shedId === null ? (await this.tx.find(ShedRow)).map((shed) => shed.id) : [shedId];
    for (const id of sheds) this.remade.set(id, Math.min(from, this.remade.get(id) ?? from));
  }

  /** Throws where a form names a shed that there is not, or that whoever asks has no say over. */
  async requireShed(shedId: string, path = 'shedId'): Promise<ShedRow> {
    const shed = await this.tx.findOneBy(ShedRow, { id: shedId });
    if (!shed) throw wrongField(path, 'There is no such shed. Choose one of the list.');
    this.requireOwn(shedId);
    return shed;
  }

  /** Throws `other-shed` where whoever asks has no say over a shed. */
  requireOwn(shedId: string): void {
    if (!maySeeShed(this.principal, shedId)) throw new ApiError('other-shed');
  }

  async finish(): Promise<{ shedIds: (string | null)[]; seq: number | null }> {
    await recordChanges(this.tx, this.recorded);
    for (const [shedId, from] of this.remade) await remakeLines(this.tx, shedId, from);
    this.changes.add(null, 'reference', '');
    return this.changes.write(this.tx);
  }
}

/**
 * Carries out a change of set-up whole or not at all: what it writes, its row in the record of changes, the lines that
 * it changes and the number by which tablets hear of it are one transaction.
 */
export async function changeSetUp(
  deps: Deps,
  principal: Principal,
  work: (change: SetUpChange) => Promise<Changed>,
): Promise<Changed> {
  const { changed, shedIds, seq } = await deps.writer.write(async (tx) => {
    const change = new SetUpChange(tx, principal, deps.now());
    const done = await work(change);
    return { changed: done, ...(await change.finish()) };
  });
  if (seq !== null) for (const shedId of new Set(shedIds)) deps.feed.announce(shedId, seq);
  return changed;
}
