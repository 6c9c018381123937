import { Injectable, computed, inject, signal } from '@angular/core';
import { toObservable } from '@angular/core/rxjs-interop';
import { filter, from, switchMap } from 'rxjs';
import { type ShedList, ReportsClient } from './reports-client';
import { SessionStore } from './session-store';

const KEY = 'shedbeat.shed.1';
type Shed = ShedList['sheds'][number];

/** Which shed the office screens are about: the person's own, as last chosen in this browser. */
@Injectable({ providedIn: 'root' })
export class Place {
  private readonly session = inject(SessionStore);
  private readonly reports = inject(ReportsClient);
  private readonly known = signal<readonly Shed[]>([]);
  private readonly chosen = signal(remembered());

  readonly sheds = computed(() => {
    const own = this.session.person()?.shedIds ?? [];
    return own.length === 0 ? this.known() : this.known().filter((shed) => own.includes(shed.id));
  });
  /** Null: not known yet. */
  readonly shedId = computed(() => {
    const tablet = this.session.device()?.shedId;
    if (tablet) return tablet;
    const sheds = this.sheds();
    const chosen = this.chosen();
    if (sheds.length === 0) return this.session.person()?.shedIds[0] ?? chosen;
    return sheds.find((shed) => shed.id === chosen)?.id ?? sheds[0]?.id ?? null;
  });
  readonly name = computed(() => this.known().find((shed) => shed.id === this.shedId())?.name ?? '');

  constructor() {
    toObservable(this.session.person)
      .pipe(
        filter((person) => person?.permissions.includes('sheet.read') ?? false),
        switchMap(() => from(this.reports.sheds())),
      )
      .subscribe((answer) => {
        if (answer.kind === 'ok') this.known.set(answer.body.sheds);
      });
  }

  choose(shedId: string): void {
    this.chosen.set(shedId);
    try {
      localStorage.setItem(KEY, shedId);
    } catch {
      // It is chosen while this page is open.
    }
  }

  /** Asks again, where the first answer never came. */
  async look(): Promise<void> {
    if (this.known().length > 0) return;
    const answer = await this.reports.sheds();
    if (answer.kind === 'ok') this.known.set(answer.body.sheds);
  }
}

function remembered(): string | null {
  try {
    return localStorage.getItem(KEY);
  } catch {
    return null;
  }
}
