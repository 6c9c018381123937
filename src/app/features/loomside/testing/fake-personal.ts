import { signal } from '@angular/core';
import type { UsualRow } from '@shared/contract/usual';
import type { PernWay } from '../../../offline/personal-ways';

/** Stands for `HalfTyped`: in memory, of one person. */
export class FakeHalfTyped {
  readonly texts = signal<Readonly<Record<string, string>>>({});
  readonly ready = signal(true);

  of(what: string): string {
    return this.texts()[what] ?? '';
  }
  keep(what: string, text: string): void {
    this.texts.update((texts) => ({ ...texts, [what]: text }));
  }
}

/** Stands for `PersonalWays`. */
export class FakeWays {
  readonly perns = signal<PernWay>('each-loom');
  readonly ready = signal(true);

  countPerns(way: PernWay): void {
    this.perns.set(way);
  }
}

/** Stands for `UsualStore`: rows by loom, whatever the cloth. */
export class FakeUsual {
  readonly rows = signal<Readonly<Record<string, UsualRow>>>({});

  rowOf(loomId: string): UsualRow | null {
    return this.rows()[loomId] ?? null;
  }
}
