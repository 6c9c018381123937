import { simpleParser } from 'mailparser';
import { smtpCarrier } from '../../mail/mail-carrier.js';
import { TEST_CERT, TestMailServer } from '../../testing/mail-server.js';
import { testServer, type SignedInActor, type TestServer } from '../../testing/test-server.js';

const FORM = {
  host: 'localhost',
  port: 587,
  security: 'starttls',
  user: 'shedbeat',
  password: 'a mail password',
  from: 'shedbeat@mill.example',
};

describe('mail of the mill', () => {
  let server: TestServer;
  let mail: TestMailServer;
  let manager: SignedInActor;
  beforeEach(async () => {
    mail = await TestMailServer.start({
      security: 'starttls',
      account: { user: FORM.user, password: FORM.password },
    });
    server = await testServer({ deps: { carrier: smtpCarrier({ ca: TEST_CERT }) } });
    manager = await server.signInAs('manager');
  });
  afterEach(async () => {
    await server.close();
    await mail.close();
  });

  const read = async () => (await server.call('get', '/set-up/mail', { as: manager })).body;
  const set = (body: object) =>
    server.call('patch', '/set-up/mail', { as: manager, body: { ...FORM, port: mail.port, ...body } });
  const test = (to = 'maud@mill.example') =>
    server.call('post', '/set-up/mail/test', { as: manager, body: { to } });

  it('is off until it is set up', async () => {
    expect(await read()).toEqual({
      host: null,
      port: 587,
      security: 'starttls',
      user: '',
      hasPassword: false,
      from: '',
      baseUrl: 'http://shedbeat.test',
    });
  });

  it('keeps what is set and never says the password, not to the record of changes either', async () => {
    const { password, ...told } = FORM;
    const answer = await set({});
    const { port } = mail;
    expect(answer.body).toEqual({ ...told, port, hasPassword: true, baseUrl: 'http://shedbeat.test' });
    expect(await read()).toEqual(answer.body);
    await set({ password: undefined, from: 'Other@mill.example' });
    expect(await read()).toMatchObject({ hasPassword: true, from: 'other@mill.example' });
    await set({ password: '', user: '' });
    expect((await read()).hasPassword).toBe(false);
    const changes: { after: string }[] = await server.deps.reads.query('SELECT * FROM "recorded_change"');
    expect(changes).toHaveLength(3);
    expect(changes.map(({ after }) => JSON.parse(after).password)).toEqual([
      'set anew',
      undefined,
      'taken away',
    ]);
    expect(JSON.stringify(changes)).not.toContain(password);
  });

  const BAD: [string, object, string][] = [
    ['a server with its scheme', { host: 'https://smtp.mill.example' }, 'host'],
    ['a server with its port', { host: 'smtp.mill.example:587' }, 'host'],
    ['a port that there is none of', { port: 70_000 }, 'port'],
    ['no port', { port: 0 }, 'port'],
    ['a way that there is none of', { security: 'ssl' }, 'security'],
    ['no sender', { from: '' }, 'from'],
    ['a sender that is no address', { from: 'the mill' }, 'from'],
    ['a password without a user', { user: '' }, 'user'],
  ];
  it.each(BAD)('refuses %s, marks it, and changes nothing', async (_what, body, field) => {
    const answer = await set(body);
    expect([answer.status, answer.body.fields?.map(({ path }: { path: string }) => path)]).toEqual([
      400,
      [field],
    ]);
    expect((await read()).host).toBeNull();
  });

  it('sends a test letter by a real conversation', async () => {
    await set({});
    const answer = await test();
    expect(answer.body).toMatchObject({ to: 'maud@mill.example', state: 'sent', trouble: null });
    expect(mail.arrived).toMatchObject([{ to: 'maud@mill.example', secure: true, user: 'shedbeat' }]);
  });

  it('tries a failed letter again when it is asked, and no other', async () => {
    await set({ password: 'another' });
    const failed = (await test()).body;
    const again = (id: string) => server.call('post', `/set-up/letters/${id}/again`, { as: manager });
    expect((await again(failed.id)).body).toMatchObject({ id: failed.id, state: 'failed' });
    await set({});
    expect((await again(failed.id)).body).toMatchObject({ id: failed.id, state: 'sent', trouble: null });
    expect(mail.arrived).toMatchObject([{ to: 'maud@mill.example' }]);
    expect((await again(failed.id)).body.code).toBe('not-found');
    expect((await again('no-such')).body.code).toBe('not-found');
  });

  it('says at once why a test letter did not go out, and does not try it again', async () => {
    await set({ password: 'another' });
    const answer = await test();
    expect(answer.body).toMatchObject({
      state: 'failed',
      trouble: expect.stringMatching(/does not take this user and password/),
    });
    await set({});
    server.clock.pass(86_400_000);
    await server.deps.post.deliverDue();
    expect(mail.arrived).toEqual([]);
  });

  it('tries what waits as soon as the settings are mended', async () => {
    await set({ password: 'another' });
    const invited = await server.call('post', '/people/wanda/invite', { as: manager });
    expect(invited.body).toMatchObject({ state: 'waiting', trouble: expect.any(String) });
    await set({});
    await server.deps.post.deliverDue();
    expect(mail.arrived).toMatchObject([{ to: 'wanda@mill.example' }]);
  });

  it('lists letters newest first, and lets those be read that did not go out', async () => {
    const kept = await server.call('post', '/people/wanda/invite', { as: manager });
    expect(kept.body.state).toBe('kept');
    server.clock.pass(1_000);
    await set({});
    const sent = await test();
    const list = await server.call('get', '/set-up/letters', { as: manager });
    expect(list.body.letters).toEqual([sent.body, kept.body]);

    const text = await server.call('get', `/set-up/letters/${kept.body.id}`, { as: manager });
    expect(text.body).toEqual({
      ...kept.body,
      text: expect.stringContaining('http://shedbeat.test/welcome#'),
    });
    const file = await server.call('get', `/set-up/letters/${kept.body.id}/file`, { as: manager });
    expect(file.headers['content-type']).toMatch(/^message\/rfc822/);
    expect((await simpleParser(String(file.text ?? file.body))).text).toBe(text.body.text);

    for (const path of [`/set-up/letters/${sent.body.id}`, `/set-up/letters/${sent.body.id}/file`])
      expect((await server.call('get', path, { as: manager })).body.code).toBe('not-found');
  });

  it('is the whole mill’s: a manager of one shed neither sets it nor reads letters', async () => {
    await server.call('patch', '/people/fay', { as: manager, body: { roles: ['manager'] } });
    const fay = await server.signInAs('southForeman');
    const kept = await server.call('post', '/people/wanda/invite', { as: manager });
    for (const path of ['/set-up/mail', '/set-up/letters', `/set-up/letters/${kept.body.id}`])
      expect((await server.call('get', path, { as: fay })).body.code).toBe('other-shed');
  });

  describe('without PUBLIC_ORIGIN', () => {
    it('begins links with where a manager works, and never with what a stranger names', async () => {
      const plain = await testServer({ settings: { publicOrigins: [] } });
      const from = (origin: string, method: 'post' | 'patch', path: string, body: object, as = {}) =>
        plain.call(method, path, { body, origin, ...as }).set('Host', origin.replace('http://', ''));
      const signedIn = await from('http://mill.lan:4280', 'post', '/sessions/office', {
        email: 'maud@mill.example',
        password: 'a long password',
        browserId: '0195e000-0000-7000-8000-0000000000bb',
      });
      const as = { as: { authorization: `Bearer ${signedIn.body.accessToken}` } };
      const linkOf = async () => {
        const list = await plain.call('get', '/set-up/letters', as);
        const { id } = list.body.letters[0];
        return (await plain.call('get', `/set-up/letters/${id}`, as)).body.text as string;
      };
      await from('http://mill.lan:4280', 'post', '/people/wanda/invite', {}, as);
      expect(await linkOf()).toContain('http://mill.lan:4280/welcome#');
      plain.clock.pass(1_000);
      await from('http://evil.example', 'post', '/sessions/forgotten', { email: 'wilf@mill.example' });
      await plain.deps.post.deliverDue();
      expect(await linkOf()).toContain('http://mill.lan:4280/welcome#');
      plain.clock.pass(1_000);
      await from('http://localhost:4280', 'post', '/people/fred/invite', {}, as);
      expect(await linkOf()).toContain('http://mill.lan:4280/welcome#');
      await plain.close();
    });
  });
});
