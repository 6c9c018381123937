import { existsSync, readFileSync, statSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { simpleParser } from 'mailparser';
import { LetterRow, MailSettingsRow } from '../database/entities/index.js';
import { TEST_CERT, TestMailServer, type MailServerOptions, type Refusal } from '../testing/mail-server.js';
import { testServer, type TestServer } from '../testing/test-server.js';
import { testWords } from './letters.js';
import { smtpCarrier } from './mail-carrier.js';
import { LETTERS_STAY, letterFile, PostOffice, WAITS } from './post-office.js';

const QUICK = { connectionTimeout: 400, greetingTimeout: 400, socketTimeout: 2_000 };
const ACCOUNT = { user: 'shedbeat', password: 'a mail password' };

describe('the post', () => {
  let server: TestServer;
  let mail: TestMailServer | null;
  beforeEach(async () => {
    mail = null;
    server = await testServer({ deps: { carrier: smtpCarrier({ ca: TEST_CERT, patience: QUICK }) } });
  });
  afterEach(async () => {
    await server.close();
    await mail?.close();
  });

  const use = (settings: Partial<MailSettingsRow>) =>
    server.deps.writer.write((tx) =>
      tx.getRepository(MailSettingsRow).save({
        id: 1,
        host: 'localhost',
        port: mail?.port ?? 1,
        security: 'none',
        user: '',
        password: null,
        from: 'shedbeat@mill.example',
        baseUrl: null,
        ...settings,
      }),
    );
  const post = (until: number | null = null, queued = true) =>
    server.deps.writer.write((tx) =>
      server.deps.post.post(tx, {
        ...testWords('Test mill', 'Maud Test'),
        purpose: 'test',
        to: 'nell@mill.example',
        until,
        queued,
      }),
    );
  const letter = (id: string) => server.deps.reads.getRepository(LetterRow).findOneByOrFail({ id });

  const CARRIED: [string, MailServerOptions, Partial<MailSettingsRow>][] = [
    ['without encryption', {}, {}],
    ['by STARTTLS', { security: 'starttls' }, { security: 'starttls' }],
    ['by TLS from the start', { security: 'tls' }, { security: 'tls' }],
    [
      'signed in',
      { security: 'starttls', account: ACCOUNT },
      { security: 'starttls', user: ACCOUNT.user, password: ACCOUNT.password },
    ],
  ];
  it.each(CARRIED)('carries a letter %s', async (_how, options, settings) => {
    mail = await TestMailServer.start(options);
    await use(settings);
    const id = await post();
    await server.deps.post.deliverDue();
    expect(mail.arrived).toMatchObject([
      {
        from: '"Test mill" <shedbeat@mill.example>',
        to: 'nell@mill.example',
        subject: 'A test letter from the shift book of Test mill',
        text: expect.stringContaining('Maud Test tries whether letters'),
        html: expect.stringContaining('<p>Maud Test tries whether letters'),
        messageId: `<${id}@mill.example>`,
        secure: (settings.security ?? 'none') !== 'none',
        user: settings.user ?? null,
      },
    ]);
    // What was sent is forgotten here.
    expect(await letter(id)).toMatchObject({
      state: 'sent',
      dueAt: null,
      text: null,
      html: null,
      trouble: null,
    });
    await server.deps.post.deliverDue();
    expect(mail.arrived).toHaveLength(1);
  });

  const TROUBLES: [string, MailServerOptions | null, Partial<MailSettingsRow>, RegExp][] = [
    ['a port where nothing answers', null, {}, /Nothing answers at localhost on port 1\. Check the port/],
    ['an unknown server', null, { host: 'no-such.invalid' }, /no server by the name no-such\.invalid/],
    [
      'a wrong password',
      { account: ACCOUNT },
      { user: ACCOUNT.user, password: 'another' },
      /does not take this user and password \(it said “535 Invalid username or password”\)\. Type both again/,
    ],
    [
      'no user where one is asked for',
      { account: ACCOUNT },
      {},
      /only from whoever signs in .*Enter user and password/,
    ],
    ['no STARTTLS there', {}, { security: 'starttls' }, /does not encrypt when asked to/],
    ['TLS where there is none', {}, { security: 'tls' }, /does not begin with TLS\. Choose STARTTLS/],
    ['no TLS where there is', { security: 'tls' }, { security: 'none' }, /does not answer in time/],
  ];
  it.each(TROUBLES)('says what is wrong and what to do: %s', async (_what, options, settings, words) => {
    if (options) mail = await TestMailServer.start(options);
    await use(settings);
    const id = await post();
    await server.deps.post.deliverDue();
    const row = await letter(id);
    expect(row.trouble).toMatch(words);
    expect(row).toMatchObject({ state: 'waiting', tries: 1, dueAt: server.clock.now + WAITS[0]! });
    expect(row.text).not.toBeNull();
    expect(mail?.arrived ?? []).toEqual([]);
  });

  it('does not trust a certificate that nobody vouches for', async () => {
    mail = await TestMailServer.start({ security: 'starttls' });
    await use({ security: 'starttls' });
    const id = await post();
    const strict = new PostOffice({ ...server.deps, carrier: smtpCarrier({ patience: QUICK }) });
    await strict.deliverDue();
    expect((await letter(id)).trouble).toMatch(
      /certificate of localhost is not one .*“self-signed certificate”/,
    );
  });

  it('does not wait for ever on a server that says nothing', async () => {
    const silent = createServer(() => undefined);
    await new Promise<void>((resolve) => silent.listen(0, '127.0.0.1', () => resolve()));
    await use({ host: '127.0.0.1', port: (silent.address() as AddressInfo).port });
    const id = await post();
    await server.deps.post.deliverDue();
    silent.close();
    expect((await letter(id)).trouble).toMatch(/does not answer in time/);
  });

  const REFUSED: [Refusal, LetterRow['state'], RegExp][] = [
    [
      { at: 'rcpt', code: 450, words: 'mailbox busy' },
      'waiting',
      /cannot take it now .*mailbox busy.*tried again/,
    ],
    [{ at: 'data', code: 452, words: 'disk full' }, 'waiting', /cannot take it now/],
    [{ at: 'rcpt', code: 550, words: 'no such user' }, 'failed', /does not take letters to this address/],
    [{ at: 'mail', code: 553, words: 'not yours' }, 'failed', /sender’s address .*that belongs to the user/],
    [{ at: 'data', code: 554, words: 'looks like spam' }, 'failed', /refused the letter .*looks like spam/],
  ];
  it.each(REFUSED)('tells “not now” from “never”: %o', async (refusal, state, words) => {
    mail = await TestMailServer.start();
    mail.refusal = refusal;
    await use({});
    const id = await post();
    await server.deps.post.deliverDue();
    const row = await letter(id);
    expect([row.state, row.trouble]).toEqual([state, expect.stringMatching(words)]);
  });

  it('tries again when it is time, not before, and after a restart', async () => {
    mail = await TestMailServer.start();
    mail.refusal = { at: 'rcpt', code: 450, words: 'mailbox busy' };
    await use({});
    const id = await post();
    await server.deps.post.deliverDue();
    mail.refusal = null;
    server.clock.pass(WAITS[0]! - 1);
    await server.deps.post.deliverDue();
    expect(mail.arrived).toEqual([]);
    server.clock.pass(1);
    // As after a restart: nothing of the queue is in memory.
    await new PostOffice(server.deps).deliverDue();
    expect(mail.arrived).toHaveLength(1);
    expect(await letter(id)).toMatchObject({ state: 'sent', tries: 1 });
  });

  it('gives up at last, and says why', async () => {
    await use({});
    const id = await post();
    for (const wait of [0, ...WAITS]) {
      server.clock.pass(wait);
      await server.deps.post.deliverDue();
    }
    expect(await letter(id)).toMatchObject({ state: 'failed', tries: WAITS.length + 1, dueAt: null });
    expect((await letter(id)).trouble).toMatch(/Nothing answers/);
  });

  it('sends no link that has run out meanwhile', async () => {
    mail = await TestMailServer.start();
    await use({});
    const id = await post(server.clock.now + 1_000);
    server.clock.pass(1_000);
    await server.deps.post.deliverDue();
    expect(mail.arrived).toEqual([]);
    expect(await letter(id)).toMatchObject({
      state: 'failed',
      trouble: expect.stringMatching(/link in it ran out/),
    });
  });

  it('tries a letter once that is not to be queued', async () => {
    await use({});
    const id = await post(null, false);
    await server.deps.post.deliverDue();
    expect((await letter(id)).state).toBe('waiting');
    expect(await server.deps.post.deliver(id)).toMatchObject({ state: 'failed', tries: 1, dueAt: null });
  });

  it('carries one letter once, whoever asks for it meanwhile', async () => {
    mail = await TestMailServer.start();
    await use({});
    const id = await post();
    const { post: office } = server.deps;
    await Promise.all([office.deliver(id), office.deliverDue(), office.deliver(id)]);
    expect(mail.arrived).toHaveLength(1);
  });

  it('keeps letters as files where there is no mail server', async () => {
    const id = await post();
    await server.deps.post.deliverDue();
    expect(await letter(id)).toMatchObject({ state: 'kept', dueAt: null, trouble: null });
    const file = letterFile(server.deps.settings.dataDir, id);
    expect(existsSync(file)).toBe(true);
    expect(statSync(file).mode & 0o077).toBe(0);
    const parsed = await simpleParser(readFileSync(file));
    expect(parsed.subject).toBe('A test letter from the shift book of Test mill');
    expect(parsed.text).toContain('Maud Test tries whether letters');
    expect(parsed.date?.getTime()).toBe(server.clock.now);
  });

  it('removes sent and kept letters with their files after 90 days, and no others', async () => {
    const { post: office, settings } = server.deps;
    const kept = await post();
    await office.deliverDue();
    mail = await TestMailServer.start();
    await use({});
    const sent = await post();
    await office.deliverDue();
    const failed = await post(server.clock.now);
    await office.deliverDue();
    const left = async () =>
      (await server.deps.reads.getRepository(LetterRow).find()).map(({ id }) => id).sort();
    server.clock.pass(LETTERS_STAY);
    await office.purge();
    expect(await left()).toEqual([kept, sent, failed].sort());
    server.clock.pass(1);
    await office.purge();
    expect(await left()).toEqual([failed]);
    expect(existsSync(letterFile(settings.dataDir, kept))).toBe(false);
  });
});
