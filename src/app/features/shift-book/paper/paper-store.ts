import { Injectable, computed, inject, linkedSignal, signal } from '@angular/core';
import { inForceAt, type Shift } from '@shared/contract/reference';
import { stoppedMeal } from '@shared/figures/loom-line';
import * as z from 'zod/mini';
import { Clock } from '../../../core/clock';
import type { EntryDraft } from '../../../offline/entry-draft';
import { NotSaved, notSaved } from '../../../offline/not-saved';
import { OfflineBook } from '../../../offline/offline-book';
import { ScreenDrafts } from '../../../offline/screen-drafts';
import { ShedBook, type CardInBook } from '../../../offline/shed-book';
import {
  CARD_FIELDS,
  EMPTY_CARD,
  cardText,
  checkCard,
  sameCard,
  type CardAround,
  type CardCheck,
  type CardField,
  type CardPlace,
  type CardText,
  type TypedCards,
  withTyped,
} from './card';
import { numberedCauses } from './numbered-causes';

/** A row of the grid. */
export interface PaperRow {
  readonly place: CardPlace;
  readonly text: CardText;
  readonly check: CardCheck;
  /** The card that is in the book, or waits to be. */
  readonly inBook: CardInBook | null;
  /** Typed and not put in yet. */
  readonly changed: boolean;
}

const draftSchema = z.record(
  z.string(),
  z.object({
    start: z.string(),
    end: z.string(),
    picks: z.string(),
    warp: z.string(),
    weft: z.string(),
    perns: z.string(),
    others: z.string(),
    weaver: z.string(),
    kept: z.boolean(),
  }),
);

const AGAIN = 'Typed in again from the card';
const TAKEN_BACK = 'The card was taken back';

/** One shift's cards as they are typed: kept on the device at every key, put in the book together. One for a page. */
@Injectable()
export class PaperStore {
  private readonly book = inject(OfflineBook);
  private readonly shed = inject(ShedBook);
  private readonly drafts = inject(ScreenDrafts);
  private readonly clock = inject(Clock);

  /** Set by the page from the address. */
  readonly shiftKey = signal('');
  /** The shift, once this device knows it; null: it does not. */
  readonly shift = computed<Shift | null>(
    () => this.book.shifts().find((shift) => shift.key === this.shiftKey()) ?? null,
  );
  /** What was typed and is not put in, by loom; null: not read from the device yet. */
  private readonly typed = linkedSignal<string, TypedCards | null>({
    source: this.shiftKey,
    computation: () => null,
  });
  readonly ready = computed(() => this.book.ready() && this.typed() !== null);
  readonly busy = signal(false);
  /** Why the last act is not on this device's disk; empty: it is. */
  readonly failure = signal('');
  /** The last act of putting in, which one void takes back. */
  readonly lastBatch = signal<{ readonly id: string; readonly looms: readonly string[] } | null>(null);

  readonly around = computed<CardAround>(() => ({
    causes: numberedCauses(this.book.reference(), this.shift()?.startsAt ?? 0),
    people: this.book.people(),
  }));
  private readonly cards = computed<ReadonlyMap<string, CardInBook>>(() => {
    const shift = this.shift();
    return shift ? this.shed.cardsIn(shift) : new Map();
  });
  private readonly places = computed<readonly CardPlace[]>(() => {
    const shift = this.shift();
    return shift ? this.book.looms().map((loom) => this.placeOf(loom.id, loom.number, shift)) : [];
  });
  readonly rows = computed<readonly PaperRow[]>(() => {
    const [typed, around, cards] = [this.typed() ?? {}, this.around(), this.cards()];
    return this.places().map((place) => {
      const inBook = cards.get(place.loomId) ?? null;
      const stored = inBook ? cardText(inBook.entry, around) : EMPTY_CARD;
      const text = typed[place.loomId] ?? stored;
      return { place, text, check: checkCard(text, place, around), inBook, changed: !sameCard(text, stored) };
    });
  });

  /** Reads what was half typed. */
  async open(shiftKey: string): Promise<void> {
    this.shiftKey.set(shiftKey);
    const read = await this.drafts.read(draftName(shiftKey)).catch(() => null);
    const parsed = draftSchema.safeParse(read ?? {});
    if (this.shiftKey() === shiftKey) this.typed.set(parsed.success ? parsed.data : {});
  }

  type(row: PaperRow, field: CardField, text: string): void {
    // Whatever was asked about is asked again once it is changed.
    this.set(row, { [field]: text, kept: false });
  }

  keep(row: PaperRow, kept: boolean): void {
    this.set(row, { kept });
  }

  /** Puts in what is whole; what is not stays typed. Says how many cards went in. */
  async putIn(): Promise<number> {
    const shift = this.shift();
    const ready = this.rows().filter((row) => row.changed && row.check.said !== null);
    const cleared = this.rows().filter((row) => row.changed && row.check.blank && row.inBook);
    if (!shift || this.busy() || ready.length + cleared.length === 0) return 0;
    const sheets = ready.map((row) => this.draftOf(row, shift));
    const saved = await this.act(async () => {
      // The new ones first: between the two acts a card stands twice, never not at all.
      const entries = await this.book.logAll(sheets);
      const gone = [...ready, ...cleared].flatMap((row) => row.inBook ?? []);
      const voids = gone.map((card) =>
        voidOf(
          card,
          shift,
          cleared.some((row) => row.inBook === card),
        ),
      );
      await this.book.logAll(voids);
      const id = entries[0]?.batchId;
      this.lastBatch.set(id ? { id, looms: ready.map(({ place }) => place.loomId) } : null);
    });
    if (saved) this.forget([...ready, ...cleared].map(({ place }) => place.loomId));
    return saved ? ready.length + cleared.length : 0;
  }

  /** Takes the last act back; what was typed stays in the grid, to be mended and put in again. */
  async takeBack(): Promise<void> {
    const batch = this.lastBatch();
    if (!batch) return;
    const rows = this.rows().filter(({ place }) => batch.looms.includes(place.loomId));
    const done = await this.act(async () => {
      await this.book.undoBatch(batch.id, TAKEN_BACK);
      this.lastBatch.set(null);
    });
    if (done) for (const row of rows) this.set(row, row.text);
  }

  private async act(work: () => Promise<void>): Promise<boolean> {
    this.busy.set(true);
    try {
      await work();
      this.failure.set('');
      return true;
    } catch (error) {
      this.failure.set((error instanceof NotSaved ? error : notSaved(error)).sentence);
      return false;
    } finally {
      this.busy.set(false);
    }
  }

  private draftOf(row: PaperRow, shift: Shift): EntryDraft {
    return {
      kind: 'sheet',
      shiftKey: shift.key,
      shedId: shift.shedId,
      loomId: row.place.loomId,
      // Paper names no minute: the shift's end, or now while it runs, by this device's clock.
      at: Math.min(shift.endsAt - this.clock.offset(), this.clock.now()),
      source: 'paper',
      ...(row.check.said ?? { counts: {}, minutes: {} }),
    };
  }

  private placeOf(loomId: string, loomNumber: number, shift: Shift): CardPlace {
    const versions = this.book.reference().loomVersions.filter((one) => one.loomId === loomId);
    const version = inForceAt(versions, shift.startsAt) ?? versions[0];
    const line = this.book.lineOf(loomId, shift);
    const own = this.cards().get(loomId)?.id;
    const inBook = (boundary: 'start' | 'end') => {
      const found = line?.readings.find((one) => one.boundary === boundary && one.id !== own);
      return found ? found.value : null;
    };
    const meal = stoppedMeal(shift);
    return {
      loomId,
      loomNumber,
      clock: version?.clock ?? null,
      ppm: version?.ppm ?? null,
      minutes: (shift.endsAt - shift.startsAt - (meal ? meal.until - meal.from : 0)) / 60_000,
      startInBook: inBook('start'),
      endInBook: inBook('end'),
    };
  }

  private set(row: PaperRow, change: Partial<CardText>): void {
    this.change(withTyped(this.typed() ?? {}, row.place.loomId, row.text, change));
  }

  private forget(loomIds: readonly string[]): void {
    const rest = Object.entries(this.typed() ?? {}).filter(([loomId]) => !loomIds.includes(loomId));
    this.change(Object.fromEntries(rest));
  }

  private change(typed: TypedCards): void {
    this.typed.set(typed);
    const empty = Object.values(typed).every((card) => CARD_FIELDS.every((field) => card[field] === ''));
    this.drafts
      .keep(draftName(this.shiftKey()), empty && this.cards().size === 0 ? null : typed)
      .catch((error: unknown) => this.failure.set(notSaved(error).sentence));
  }
}

const draftName = (shiftKey: string) => `paper:${shiftKey}`;

function voidOf(card: CardInBook, shift: Shift, cleared: boolean): EntryDraft {
  return {
    kind: 'void',
    shedId: shift.shedId,
    targetId: card.id,
    reason: cleared ? TAKEN_BACK : AGAIN,
    ...(card.basedOn !== null && { basedOn: card.basedOn }),
  };
}
