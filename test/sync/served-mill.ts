import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import {
  testServer,
  type SignedInActor,
  type TestServer,
  type TestServerOptions,
} from '../../api/testing/test-server.js';

/** The real server with the test mill, on a port of its own. */
export interface ServedMill {
  readonly server: TestServer;
  readonly url: string;
  close(): Promise<void>;
}

export async function servedMill(options?: TestServerOptions): Promise<ServedMill> {
  const server = await testServer(options);
  const http: Server = createServer(server.app);
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  const { port } = http.address() as AddressInfo;
  return {
    server,
    url: `http://127.0.0.1:${port}`,
    close: async () => {
      http.closeAllConnections();
      await new Promise((resolve) => http.close(resolve));
      await server.close();
    },
  };
}

export type { SignedInActor };
