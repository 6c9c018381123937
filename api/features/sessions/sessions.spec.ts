import { testServer, type TestServer } from '../../testing/test-server.js';

describe('signing in', () => {
  let server: TestServer;
  beforeAll(async () => {
    server = await testServer();
  });
  afterAll(() => server.close());

  it('knows each role with its rights', async () => {
    for (const who of ['weaver', 'tackler', 'foreman', 'manager'] as const) {
      const { session } = await server.signInAs(who);
      expect(session.person?.roles).toEqual([who]);
      expect(session.grant).toMatchObject({ personId: session.person?.id, deviceId: session.device?.id });
    }
  });
});
