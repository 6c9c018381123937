import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { In, LessThan, LessThanOrEqual, type DataSource, type EntityManager } from 'typeorm';
import type { Logger } from 'pino';
import { v7 as uuid } from 'uuid';
import { LetterRow, MailSettingsRow, MillRow } from '../database/entities/index.js';
import type { Writer } from '../database/writer.js';
import type { Settings } from '../settings.js';
import type { LetterWords } from './letters.js';
import { asEml, type MailCarrier, type MailMessage } from './mail-carrier.js';
import { mailTroubleOf, type MailTrouble } from './mail-trouble.js';

const MINUTE = 60_000;
/** After the first try that came to nothing, the second, …; after the last of these the letter has failed. */
export const WAITS = [1, 5, 15, 60, 180, 360, 720].map((minutes) => minutes * MINUTE);
/** How often the server looks whether a letter is due, ms. */
const LOOK = 1_000;
const DAY = 86_400_000;
/** How long letters that went out or are kept stay, ms: their links ran out long before. */
export const LETTERS_STAY = 90 * DAY;
/** How long closing waits for a conversation under way, ms. */
const GRACE = 3_000;

const TOO_LATE: MailTrouble = {
  again: false,
  sentence: 'The link in it ran out before it could go out. Send a new one.',
};

export interface PostDeps {
  readonly settings: Pick<Settings, 'dataDir'>;
  readonly reads: DataSource;
  readonly writer: Writer;
  readonly log: Logger;
  readonly now: () => number;
  readonly carrier: MailCarrier;
}

export interface NewLetter extends LetterWords {
  readonly purpose: LetterRow['purpose'];
  readonly to: string;
  /** After this moment it is worth nothing. Null: never. */
  readonly until: number | null;
  /** False: it goes out by `deliver` alone, at once or not at all. */
  readonly queued: boolean;
}

/**
 * The queue of letters. It lies in the book, so a restart forgets none; one is carried at a time. Without a mail
 * server letters are kept as .eml in the data folder.
 */
export class PostOffice {
  private turn: Promise<unknown> = Promise.resolve();
  private timer: NodeJS.Timeout | null = null;
  private closed = false;
  private purgeAt = 0;

  constructor(private readonly deps: PostDeps) {}

  /** Puts a letter into the queue, inside the transaction that it tells of. Answers its id. */
  async post(tx: EntityManager, letter: NewLetter): Promise<string> {
    const { queued, ...words } = letter;
    const id = uuid();
    const now = this.deps.now();
    await tx.getRepository(LetterRow).insert({
      id,
      ...words,
      at: now,
      state: 'waiting',
      tries: 0,
      dueAt: queued ? now : null,
      trouble: null,
    });
    return id;
  }

  /** Looks for letters that are due, every second, until closed. */
  start(): void {
    let busy = false;
    this.timer = setInterval(() => {
      if (busy || this.closed) return;
      busy = true;
      void this.deliverDue()
        .then(() => this.purgeDaily())
        .catch((error: unknown) => this.deps.log.error(error, 'the post cannot be looked after'))
        .finally(() => (busy = false));
    }, LOOK);
    this.timer.unref();
  }

  /** Carries every letter that is due, oldest first. */
  async deliverDue(): Promise<void> {
    for (;;) {
      const due = await this.deps.reads.getRepository(LetterRow).findOne({
        where: { dueAt: LessThanOrEqual(this.deps.now()) },
        order: { dueAt: 'ASC', id: 'ASC' },
        select: { id: true },
      });
      if (!due || this.closed) return;
      await this.deliver(due.id);
    }
  }

  /** Removes sent and kept letters that are older than 90 days, and the files of these. */
  async purge(): Promise<void> {
    const old = await this.deps.reads.getRepository(LetterRow).find({
      where: { state: In(['sent', 'kept']), at: LessThan(this.deps.now() - LETTERS_STAY) },
      select: { id: true },
    });
    if (old.length === 0) return;
    // Files first: a row without its file is removed the next time, a file without its row never.
    for (const { id } of old) rmSync(letterFile(this.deps.settings.dataDir, id), { force: true });
    await this.deps.writer.write(async (tx) => {
      for (const { id } of old) await tx.getRepository(LetterRow).delete({ id });
    });
  }

  private async purgeDaily(): Promise<void> {
    if (this.closed || this.deps.now() < this.purgeAt) return;
    this.purgeAt = this.deps.now() + DAY;
    await this.purge();
  }

  /** Carries one letter now, if it still waits; answers it as it is then. */
  deliver(id: string): Promise<LetterRow | null> {
    const done = this.turn.then(() => this.carry(id));
    this.turn = done.catch(() => undefined);
    return done;
  }

  /** Stops looking, and gives the conversation under way a little time; a letter cut off is sent again later. */
  async close(): Promise<void> {
    this.closed = true;
    if (this.timer) clearInterval(this.timer);
    let patience: NodeJS.Timeout | undefined;
    await Promise.race([this.turn, new Promise((resolve) => (patience = setTimeout(resolve, GRACE)))]);
    clearTimeout(patience);
  }

  private async carry(id: string): Promise<LetterRow | null> {
    const letters = this.deps.reads.getRepository(LetterRow);
    const letter = await letters.findOneBy({ id });
    if (!letter || letter.state !== 'waiting' || this.closed) return letter;
    const became = await this.attempt(letter);
    await this.deps.writer.write((tx) => tx.getRepository(LetterRow).update({ id }, became));
    return letters.findOneBy({ id });
  }

  /** The conversation itself, outside the writer: taps do not wait for a mail server. */
  private async attempt(letter: LetterRow): Promise<Partial<LetterRow>> {
    const { reads, now, log, carrier } = this.deps;
    if (letter.until !== null && letter.until <= now()) return afterTrouble(letter, TOO_LATE, now());
    const settings = await reads.getRepository(MailSettingsRow).findOneBy({ id: 1 });
    const message = await this.messageOf(letter, settings);
    if (settings === null || settings.host === null) {
      this.keep(letter.id, await asEml(message));
      return { state: 'kept', dueAt: null, trouble: null };
    }
    const server = { ...settings, host: settings.host };
    try {
      await carrier.carry(message, server);
    } catch (error) {
      const trouble = mailTroubleOf(error, server);
      log.warn({ letterId: letter.id, trouble: trouble.sentence }, 'a letter did not go out');
      return afterTrouble(letter, trouble, now());
    }
    return { state: 'sent', dueAt: null, trouble: null, text: null, html: null };
  }

  private async messageOf(letter: LetterRow, settings: MailSettingsRow | null): Promise<MailMessage> {
    const mill = await this.deps.reads.getRepository(MillRow).findOneBy({ id: 1 });
    return {
      id: letter.id,
      from: { name: mill?.name ?? 'Shedbeat', address: settings?.from || 'shedbeat@localhost' },
      to: letter.to,
      subject: letter.subject,
      text: letter.text ?? '',
      html: letter.html ?? '',
      at: letter.at,
    };
  }

  /** Its link is a secret: the file is for the server's user alone. */
  private keep(id: string, eml: Buffer): void {
    const file = letterFile(this.deps.settings.dataDir, id);
    mkdirSync(dirname(file), { recursive: true, mode: 0o700 });
    writeFileSync(file, eml, { mode: 0o600 });
  }
}

/** Where a letter is kept that no mail server took. */
export function letterFile(dataDir: string, id: string): string {
  return join(dataDir, 'letters', `${id}.eml`);
}

function afterTrouble(
  { tries, dueAt }: LetterRow,
  { sentence, again }: MailTrouble,
  now: number,
): Partial<LetterRow> {
  const wait = again && dueAt !== null ? WAITS[tries] : undefined;
  const next = wait === undefined ? null : now + wait;
  return { tries: tries + 1, trouble: sentence, dueAt: next, state: next === null ? 'failed' : 'waiting' };
}
