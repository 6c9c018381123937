import { LIMITS } from '../../../shared/contract/limits.js';
import { LetterRow, OneTimeLinkRow, PersonRow } from '../../database/entities/index.js';
import { tokenIn } from '../../testing/mail-server.js';
import {
  browserIdOf,
  cookieHeader,
  cookiesOf,
  TEST_PASSWORD,
  testServer,
  type SignedInActor,
  type TestServer,
} from '../../testing/test-server.js';

const CHOSEN = 'twenty looms at night';

describe('one-time links', () => {
  let server: TestServer;
  let manager: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    manager = await server.signInAs('manager');
  });
  afterEach(() => server.close());

  /** The token of the newest letter. */
  async function newestToken(): Promise<string> {
    await server.deps.post.deliverDue();
    const [letter] = await server.deps.reads
      .getRepository(LetterRow)
      .find({ order: { at: 'DESC', id: 'DESC' }, take: 1 });
    return tokenIn(letter?.text ?? '');
  }
  async function invited(id = 'wanda'): Promise<string> {
    const answer = await server.call('post', `/people/${id}/invite`, { as: manager });
    expect(answer.status).toBe(200);
    return newestToken();
  }
  async function newcomer(): Promise<string> {
    const answer = await server.call('post', '/people', {
      as: manager,
      body: {
        name: 'Nell New',
        shortName: 'Nell',
        worksNumber: null,
        email: 'nell@mill.example',
        roles: ['foreman'],
        shedIds: ['north'],
      },
    });
    return answer.body.id as string;
  }
  const forgotten = (email: string) => server.call('post', '/sessions/forgotten', { body: { email } });
  const look = (token: string) => server.call('post', '/sessions/one-time/look', { body: { token } });
  const redeem = (token: string, password = CHOSEN) =>
    server.call('post', '/sessions/one-time/redeem', {
      body: { token, password, browserId: browserIdOf('tackler') },
    });
  const signIn = (email: string, password: string) =>
    server.call('post', '/sessions/office', {
      body: { email, password, browserId: browserIdOf('tackler') },
    });
  const personOf = async (id: string) => {
    const list = await server.call('get', '/people', { as: manager });
    return list.body.people.find((each: { id: string }) => each.id === id);
  };

  it('let somebody invited choose a password and be signed in', async () => {
    const id = await newcomer();
    expect(await personOf(id)).toMatchObject({ hasPassword: false, linkUntil: null });
    const token = await invited(id);
    expect(await personOf(id)).toMatchObject({ linkUntil: server.clock.now + LIMITS.inviteLink });
    expect((await look(token)).body).toEqual({
      name: 'Nell New',
      email: 'nell@mill.example',
      purpose: 'invite',
    });
    const answer = await redeem(token);
    expect(answer.body).toMatchObject({ person: { id, roles: ['foreman'] } });
    const refreshed = await server.call('post', '/sessions/refresh', {
      body: {},
      cookie: cookieHeader(cookiesOf(answer)),
    });
    expect(refreshed.body.person.id).toBe(id);
    expect((await signIn('nell@mill.example', CHOSEN)).status).toBe(200);
    expect(await personOf(id)).toMatchObject({ hasPassword: true, linkUntil: null });
  });

  it('keep of the token its hash alone, and nothing in the record of changes', async () => {
    const token = await invited();
    await redeem(token);
    const links = await server.deps.reads.getRepository(OneTimeLinkRow).find();
    expect(links).toHaveLength(1);
    expect(JSON.stringify(links)).not.toContain(token);
    const changes = await server.deps.reads.query('SELECT * FROM "recorded_change"');
    expect(changes.map((each: { name: string; byName: string }) => [each.name, each.byName])).toEqual([
      ['Wanda Test', 'Maud Test'],
      ['Wanda Test', 'Wanda Test'],
    ]);
    expect(JSON.stringify(changes)).not.toMatch(new RegExp(`${token}|\\$2`));
  });

  it('work once', async () => {
    const token = await invited();
    expect((await redeem(token)).status).toBe(200);
    for (const answer of [await look(token), await redeem(token, 'another long one')])
      expect([answer.status, answer.body.code]).toEqual([410, 'link-used']);
    expect((await signIn('wanda@mill.example', CHOSEN)).status).toBe(200);
  });

  it('work once for two pages at the same time', async () => {
    const token = await invited();
    const answers = await Promise.all([redeem(token), redeem(token, 'another long one')]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 410]);
  });

  it('are replaced by a newer one', async () => {
    const first = await invited();
    server.clock.pass(1_000);
    const second = await invited();
    expect((await look(first)).body.code).toBe('link-replaced');
    expect((await redeem(first)).body.code).toBe('link-replaced');
    expect((await redeem(second)).status).toBe(200);
  });

  it.each([
    ['an invitation', LIMITS.inviteLink, true],
    ['a reset', LIMITS.resetLink, false],
  ])('run out: %s', async (_what, lasts, isNew) => {
    const token = await invited(isNew ? await newcomer() : 'wanda');
    server.clock.pass(lasts - 1);
    expect((await look(token)).status).toBe(200);
    server.clock.pass(1);
    for (const answer of [await look(token), await redeem(token)])
      expect([answer.status, answer.body.code]).toEqual([410, 'link-expired']);
  });

  it('end with the rights and the address that they were sent to', async () => {
    const token = await invited();
    await server.call('patch', '/people/wanda', { as: manager, body: { disabled: true } });
    expect((await redeem(token)).body.code).toBe('link-expired');
    await server.call('patch', '/people/wanda', { as: manager, body: { disabled: false } });
    expect((await redeem(token)).body.code).toBe('link-replaced');
    server.clock.pass(1_000);
    const other = await invited();
    await server.call('patch', '/people/wanda', { as: manager, body: { email: 'w@mill.example' } });
    expect((await redeem(other)).body.code).toBe('link-replaced');
  });

  it.each(['x'.repeat(43), 'short', ''])('are not to be guessed: %o', async (token) => {
    const answer = await look(token);
    expect(answer.body.code).toBe(token.length === 43 ? 'link-wrong' : 'bad-request');
  });

  it('are not to be tried without end', async () => {
    const codes = new Set<string>();
    for (let tried = 0; tried < 101; tried++) codes.add((await look('x'.repeat(43))).body.code);
    expect([...codes]).toEqual(['link-wrong', 'too-many-tries']);
  });

  it.each([
    ['password-too-short', 'nine char'],
    ['password-too-long', 'ü'.repeat(37)],
  ])('say %s and are not used up by it', async (code, password) => {
    const token = await invited();
    expect((await redeem(token, password)).body.code).toBe(code);
    expect((await redeem(token)).status).toBe(200);
  });

  it('end the person’s other sign-ins, and the old password', async () => {
    const elsewhere = await server.signInAs('foreman');
    const token = await invited('fred');
    expect((await server.call('get', '/people', { as: elsewhere })).status).toBe(200);
    await redeem(token);
    expect((await server.call('get', '/people', { as: elsewhere })).body.code).toBe('session-ended');
    expect((await signIn('fred@mill.example', TEST_PASSWORD)).body.code).toBe('wrong-sign-in');
  });

  it('let in again who was locked out by wrong tries', async () => {
    for (let tried = 0; tried < 11; tried++) await signIn('fred@mill.example', 'a wrong password');
    expect((await signIn('fred@mill.example', TEST_PASSWORD)).body.code).toBe('too-many-tries');
    await redeem(await invited('fred'));
    expect((await signIn('fred@mill.example', CHOSEN)).status).toBe(200);
  });

  it('come to whoever forgot, and the answer is the same to a stranger', async () => {
    const known = await forgotten(' Fred@Mill.example ');
    const stranger = await forgotten('nobody@mill.example');
    expect([known.status, known.body]).toEqual([200, { asked: true }]);
    expect(stranger.body).toEqual(known.body);
    const letters = await server.deps.reads.getRepository(LetterRow).find();
    expect(letters).toMatchObject([{ to: 'fred@mill.example', purpose: 'reset' }]);
    expect((await redeem(await newestToken())).body.person.id).toBe('fred');
  });

  it('do not come to whoever is disabled', async () => {
    await server.call('patch', '/people/fred', { as: manager, body: { disabled: true } });
    expect((await forgotten('fred@mill.example')).status).toBe(200);
    expect(await server.deps.reads.getRepository(LetterRow).count()).toBe(0);
  });

  it('fill nobody’s letter box', async () => {
    for (const email of ['fred@mill.example', 'nobody@mill.example']) {
      for (let asked = 0; asked < 3; asked++) expect((await forgotten(email)).status).toBe(200);
      expect((await forgotten(email)).body.code).toBe('too-many-tries');
    }
    expect(await server.deps.reads.getRepository(LetterRow).count()).toBe(3);
  });

  it('need an address to go to', async () => {
    await server.deps.writer.write((tx) =>
      tx.getRepository(PersonRow).update({ id: 'wanda' }, { email: null }),
    );
    const answer = await server.call('post', '/people/wanda/invite', { as: manager });
    expect([answer.status, answer.body.code]).toEqual([409, 'no-email']);
  });

  it('do not go to who is disabled or not there', async () => {
    await server.call('patch', '/people/wanda', { as: manager, body: { disabled: true } });
    for (const id of ['wanda', 'no-such'])
      expect((await server.call('post', `/people/${id}/invite`, { as: manager })).body.code).toBe(
        'not-found',
      );
  });
});
