import { computed, signal, type Signal } from '@angular/core';
import { get, update } from 'idb-keyval';
import type { LocalDatabase } from './local-database';
import { factOf, isReadable, type Fact } from './records';

interface Kept<T> {
  readonly value: T;
  /** Device's clock. */
  readonly at: number;
}
type Facts<T> = Readonly<Record<string, Kept<T>>>;

/**
 * Small things that the device keeps for each person under a fact of its own: what they had half typed, what they
 * prefer. In memory at once, on disk soon after; none of it is the book's, and losing it loses no entry.
 */
export class PersonalFacts<T> {
  private readonly facts = signal<Facts<T>>({});
  private readonly loaded = signal(false);

  /** False until what lies on this device is read. */
  readonly ready = this.loaded.asReadonly();

  /**
   * @param person whose they are; null: nobody is here, and nothing is kept
   * @param longest what is older, ms, is forgotten
   */
  constructor(
    private readonly database: LocalDatabase,
    private readonly key: string,
    private readonly person: Signal<string | null>,
    private readonly now: () => number,
    private readonly longest = Infinity,
  ) {
    this.load()
      .catch(() => undefined)
      .finally(() => this.loaded.set(true));
  }

  /** What is kept of a thing for whoever is here. Reactive. */
  of(what: string): T | null {
    const key = this.keyOf(what);
    return (key === null ? null : this.facts()[key]?.value) ?? null;
  }

  /** The same as a signal. */
  signalOf(what: string): Signal<T | null> {
    return computed(() => this.of(what));
  }

  /** Keeps it; null forgets it. */
  keep(what: string, value: T | null): void {
    const key = this.keyOf(what);
    if (key === null) return;
    const change = (facts: Facts<T>): Facts<T> => {
      const others = Object.entries(facts).filter(([known]) => known !== key);
      const now = value === null ? [] : [[key, { value, at: this.now() }] as const];
      return Object.fromEntries([...others, ...now]);
    };
    this.facts.update(change);
    update<Fact<Facts<T>>>(
      this.key,
      (known) => factOf(change(isReadable(known) ? known.value : {})),
      this.database.store('facts'),
    ).catch(() => undefined);
  }

  private keyOf(what: string): string | null {
    const person = this.person();
    return person === null ? null : `${person} ${what}`;
  }

  private async load(): Promise<void> {
    const raw = await get<Fact<Facts<T>>>(this.key, this.database.store('facts'));
    if (!isReadable(raw)) return;
    const oldest = this.now() - this.longest;
    const young = Object.entries(raw.value).filter(([, { at }]) => at >= oldest);
    // What was typed while this was read is newer.
    this.facts.update((facts) => ({ ...Object.fromEntries(young), ...facts }));
  }
}
