import type { Loom } from '@shared/contract/reference';
import { loomsNamedBy, type Entry, type EntryKind } from '@shared/entries/entry';

/**
 * Finds entries by loom: those that name it, those that a correction moves to it, and all corrections of either.
 * The order of arrival does not matter: a correction that comes before its target waits here for it.
 */
export class EntryIndex {
  private readonly entries = new Map<string, Entry>();
  private readonly byLoom = new Map<string, Set<string>>();
  private readonly byKind = new Map<EntryKind, Set<string>>();
  private readonly corrections = new Map<string, Set<string>>();
  private readonly batches = new Map<string, Set<string>>();
  private readonly batchVoids = new Map<string, Set<string>>();

  constructor(private readonly looms: readonly Loom[]) {}

  get(id: string): Entry | undefined {
    return this.entries.get(id);
  }

  add(entry: Entry): void {
    if (this.entries.has(entry.id)) return;
    this.entries.set(entry.id, entry);
    put(this.byKind, entry.kind, entry.id);
    if (entry.batchId !== undefined) put(this.batches, entry.batchId, entry.id);
    for (const loomId of loomsNamedBy(entry, this.looms)) put(this.byLoom, loomId, entry.id);
    if (entry.kind === 'void' || entry.kind === 'amend') {
      if (entry.targetId !== undefined) put(this.corrections, entry.targetId, entry.id);
    }
    if (entry.kind === 'void' && entry.targetBatchId !== undefined)
      put(this.batchVoids, entry.targetBatchId, entry.id);
    if (entry.kind === 'amend' && entry.change.loomId !== undefined)
      put(this.byLoom, entry.change.loomId, entry.targetId);
  }

  ofKind(kind: EntryKind): string[] {
    return this.withCorrections(this.byKind.get(kind) ?? []);
  }

  /** Ids about a loom, corrections among them. */
  ofLoom(loomId: string, which: (entry: Entry) => boolean = () => true): string[] {
    const roots = [...(this.byLoom.get(loomId) ?? [])].filter((id) => {
      const entry = this.entries.get(id);
      return entry !== undefined && which(entry);
    });
    return this.withCorrections(roots);
  }

  /** Corrections of an entry, and of those. */
  correctionsOf(id: string): string[] {
    return this.withCorrections([id]).filter((one) => one !== id);
  }

  /** The looms whose lines an entry may change. */
  loomsOf(id: string): ReadonlySet<string> {
    const found = new Set<string>();
    const seen = new Set<string>();
    const look = (one: string): void => {
      if (seen.has(one)) return;
      seen.add(one);
      const entry = this.entries.get(one);
      if (!entry) return;
      for (const loomId of loomsNamedBy(entry, this.looms)) found.add(loomId);
      if (entry.kind === 'amend' && entry.change.loomId !== undefined) found.add(entry.change.loomId);
      if ('targetId' in entry && entry.targetId !== undefined) look(entry.targetId);
      if (entry.kind === 'void' && entry.targetBatchId !== undefined)
        for (const member of this.batches.get(entry.targetBatchId) ?? []) look(member);
    };
    look(id);
    // A correction that moved it to another loom touches that one too.
    for (const correction of this.corrections.get(id) ?? []) {
      const entry = this.entries.get(correction);
      if (entry?.kind === 'amend' && entry.change.loomId !== undefined) found.add(entry.change.loomId);
    }
    return found;
  }

  /**
   * The looms that an entry is about: those it names, and where it names none, those of what it corrects. A Running
   * that ends a shed stop changes what other looms' lines look at, but is about its own loom alone.
   */
  loomsAbout(id: string): ReadonlySet<string> {
    const found = new Set<string>();
    const seen = new Set<string>();
    const look = (one: string): void => {
      const entry = this.entries.get(one);
      if (!entry || seen.has(one)) return;
      seen.add(one);
      if (entry.kind === 'amend' && entry.change.loomId !== undefined) found.add(entry.change.loomId);
      const named = loomsNamedBy(entry, this.looms);
      for (const loomId of named) found.add(loomId);
      if (named.length > 0) return;
      if ('targetId' in entry && entry.targetId !== undefined) look(entry.targetId);
      if (entry.kind === 'void' && entry.targetBatchId !== undefined)
        for (const member of this.batches.get(entry.targetBatchId) ?? []) look(member);
    };
    look(id);
    return found;
  }

  private withCorrections(roots: Iterable<string>): string[] {
    const found = new Set<string>();
    const take = (id: string): void => {
      if (found.has(id)) return;
      found.add(id);
      for (const correction of this.corrections.get(id) ?? []) take(correction);
      const batchId = this.entries.get(id)?.batchId;
      if (batchId !== undefined) for (const one of this.batchVoids.get(batchId) ?? []) take(one);
    };
    for (const root of roots) take(root);
    return [...found].filter((id) => this.entries.has(id));
  }
}

function put<K>(map: Map<K, Set<string>>, key: K, id: string): void {
  const known = map.get(key);
  if (known) known.add(id);
  else map.set(key, new Set([id]));
}
