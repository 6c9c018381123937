import bcrypt from 'bcryptjs';
import { ApiError } from '../../middleware/api-error.js';
import { browserIdOf, TEST_PASSWORD, testServer } from '../../testing/test-server.js';
import { createPasswords } from './worker-passwords.js';

describe('passwords in a worker', () => {
  const passwords = createPasswords();
  afterAll(() => passwords.close());

  it('hashes with bcrypt at cost 10 at least, salted', async () => {
    const [one, other] = await Promise.all([passwords.hash('246810'), passwords.hash('246810')]);
    expect(bcrypt.getRounds(one)).toBeGreaterThanOrEqual(10);
    expect(one).not.toBe(other);
    expect(await passwords.compare('246810', one)).toBe(true);
    expect(await passwords.compare('246811', one)).toBe(false);
  });

  it('reads all of 72 bytes and refuses the 73rd', async () => {
    const longest = '€'.repeat(24);
    const hash = await passwords.hash(longest);
    expect(await passwords.compare(longest, hash)).toBe(true);
    expect(await passwords.compare('€'.repeat(23) + 'abc', hash)).toBe(false);
    await expect(passwords.hash(longest + 'x')).rejects.toMatchObject({ code: 'password-too-long' });
    await expect(passwords.compare(longest + 'x', hash)).rejects.toBeInstanceOf(ApiError);
  });

  it('is false against nobody, after as much work', async () => {
    expect(await passwords.compare('nobody has this secret', null)).toBe(false);
  });

  it('tells of a hash that is none', async () => {
    expect(await passwords.compare('x', 'not a hash')).toBe(false);
  });

  it('answers others while 24 sign in at once', async () => {
    const server = await testServer({ deps: { passwords: createPasswords() } });
    let done = 0;
    const signIns = Array.from({ length: 24 }, (_, index) =>
      server
        .call('post', '/sessions/office', {
          body: {
            email: `nobody${index}@mill.example`,
            password: TEST_PASSWORD,
            browserId: browserIdOf('manager'),
          },
        })
        .then((response) => {
          done++;
          return response.body.code as string;
        }),
    );
    for (let asked = 0; asked < 5; asked++) expect((await server.call('get', '/health')).status).toBe(200);
    // All five answers came before the compares were through: whoever compares on the main thread fails here.
    expect(done).toBeLessThan(24);
    expect(new Set(await Promise.all(signIns))).toEqual(new Set(['wrong-sign-in']));
    await server.close();
  });
});
