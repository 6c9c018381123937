import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { inForceAt } from '@shared/contract/reference';
import { formatCount } from '@shared/figures/format';
import { formatDay } from '../../../core/dates';
import { OfflineBook } from '../../../offline/offline-book';
import { clockTime } from '../../../ui/clock-time';
import { EmptyState } from '../../../ui/empty-state';
import { numberedCauses } from './numbered-causes';
import { qrPath } from './qr-path';

/** Lines on a card for stops other than breaks and perns. */
const STOP_LINES = [1, 2, 3, 4, 5, 6] as const;
const TALLY = 20;

interface LogCard {
  readonly loomId: string;
  readonly number: number;
  readonly where: string;
  readonly clock: string;
  readonly digits: readonly number[];
}

interface Qr {
  readonly size: number;
  readonly path: string;
}

/** Blank cards to print, two to an A4 page, black on white: what a weaver logs on where there is no tablet. */
@Component({
  selector: 'app-log-cards-page',
  imports: [EmptyState, MatButton, MatIcon, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './log-cards-page.html',
  styleUrls: ['../back-link.scss', './log-cards-page.scss'],
  host: { class: 'page' },
})
export class LogCardsPage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();

  protected readonly book = inject(OfflineBook);
  protected readonly stopLines = STOP_LINES;
  protected readonly tally = Array.from({ length: TALLY }, (_, i) => i + 1);
  protected readonly row = signal<number | null>(null);
  protected readonly dated = signal(true);
  /** The QR code of each loom's address, by its number; made by a library that comes when the page is opened. */
  private readonly codes = signal<ReadonlyMap<number, Qr>>(new Map());

  protected readonly shift = computed(() => this.book.shifts().find(({ key }) => key === this.key()) ?? null);
  protected readonly shedName = computed(
    () => this.book.reference().sheds.find(({ id }) => id === this.book.shedId())?.name ?? '',
  );
  protected readonly causes = computed(() =>
    numberedCauses(this.book.reference(), this.shift()?.startsAt ?? 0),
  );
  protected readonly date = computed(() => (this.shift() ? formatDay(this.shift()?.date ?? '') : ''));
  protected readonly hours = computed(() => {
    const shift = this.shift();
    const zone = this.book.reference().mill.timeZone;
    return shift ? `${shift.name}, ${clockTime(shift.startsAt, zone)}–${clockTime(shift.endsAt, zone)}` : '';
  });
  protected readonly rows = computed(() => [...new Set(this.book.looms().map((loom) => loom.row))]);
  protected readonly cards = computed<readonly LogCard[]>(() =>
    this.book
      .looms()
      .filter((loom) => this.row() === null || loom.row === this.row())
      .map((loom) => {
        const versions = this.book.reference().loomVersions.filter((one) => one.loomId === loom.id);
        const version = inForceAt(versions, this.shift()?.startsAt ?? Infinity) ?? versions[0];
        const unit = version?.clock.unit ?? 1;
        return {
          loomId: loom.id,
          number: loom.number,
          where: `Row ${loom.row}, place ${loom.position} · ${loom.alley}`,
          clock: version
            ? `${formatCount(version.ppm)} picks a minute · pick clock ${version.clock.digits} digits${unit > 1 ? `, one step is ${formatCount(unit)} picks` : ''}`
            : '',
          digits: Array.from({ length: version?.clock.digits ?? 6 }, (_, i) => i),
        };
      }),
  );
  /** Two to a page. */
  protected readonly pages = computed(() => {
    const cards = this.cards();
    return cards.flatMap((card, i) => (i % 2 === 0 ? [cards.slice(i, i + 2)] : []));
  });

  constructor() {
    effect(() => {
      const numbers = this.cards().map(({ number }) => number);
      if (numbers.length > 0) void this.makeCodes(numbers);
    });
  }

  protected codeOf(number: number): Qr | undefined {
    return this.codes().get(number);
  }

  protected choose(value: string): void {
    this.row.set(value === '' ? null : Number(value));
  }

  protected print(): void {
    window.print();
  }

  private async makeCodes(numbers: readonly number[]): Promise<void> {
    const { create } = (await import('qrcode')).default;
    const code = (number: number): Qr => {
      const { modules } = create(`${location.origin}/l/${number}`, { errorCorrectionLevel: 'M' });
      return { size: modules.size, path: qrPath(modules) };
    };
    this.codes.set(new Map(numbers.map((number) => [number, code(number)])));
  }
}
