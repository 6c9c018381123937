import { readFileSync } from 'node:fs';
import { createServer as createHttpServer, type RequestListener, type Server } from 'node:http';
import { createServer as createHttpsServer } from 'node:https';
import type { AddressInfo } from 'node:net';
import { createApp } from './app.js';
import { startBackups } from './backup/backup-hours.js';
import { CannotStart } from './cannot-start.js';
import type { Deps } from './deps.js';
import { startShiftMaker } from './features/book/shifts.js';
import { newFirstRunCode } from './features/first-run/first-run.service.js';
import { openDeps } from './open-deps.js';
import { startCallTeller } from './push/call-teller.js';
import type { Settings } from './settings.js';

export interface RunningServer {
  /** Where it listens, e.g. http://localhost:4280. */
  readonly url: string;
  readonly deps: Deps;
  /** The one-time code for the first manager; null: there is one already. */
  readonly firstRunCode: string | null;
  /** Stops taking, finishes the writer, ends streams, closes. May be called twice. */
  close(): Promise<void>;
}

/** How long requests under way may take at shutdown, ms. */
const GRACE = 5_000;

/** Starts the whole server on a data folder. Throws `CannotStart` with one sentence that says what to do. */
export async function startServer(settings: Settings, overrides: Partial<Deps> = {}): Promise<RunningServer> {
  const serverFor = serverMaker(settings);
  const opened = await openDeps(settings, overrides);
  try {
    const server = serverFor(createApp(opened.deps));
    await listen(server, settings);
    const firstRunCode = await newFirstRunCode(opened.deps);
    const stopShiftMaker = await startShiftMaker(opened.deps);
    const stopBackups = startBackups(opened.deps);
    const callTeller = await startCallTeller(opened.deps);
    opened.deps.post.start();
    let closing: Promise<void> | null = null;
    return {
      url: addressOf(server, settings),
      deps: opened.deps,
      firstRunCode,
      close: () => {
        stopShiftMaker();
        stopBackups();
        callTeller.stop();
        return (closing ??= shutDown(server, opened));
      },
    };
  } catch (error) {
    await opened.close();
    throw error;
  }
}

/** Reads the TLS files first: a bad one must not leave a data folder half open. */
function serverMaker({ tls }: Settings): (listener: RequestListener) => Server {
  if (!tls) return (listener) => createHttpServer(listener);
  const cert = readTlsFile('TLS_CERT', tls.cert);
  const key = readTlsFile('TLS_KEY', tls.key);
  return (listener) => {
    try {
      return createHttpsServer({ cert, key }, listener);
    } catch (error) {
      throw new CannotStart(
        `TLS_CERT=${tls.cert} and TLS_KEY=${tls.key} are no certificate and key that belong together (${messageOf(error)}).`,
      );
    }
  };
}

function readTlsFile(name: string, file: string): Buffer {
  try {
    return readFileSync(file);
  } catch (error) {
    throw new CannotStart(`${name}=${file} cannot be read (${messageOf(error)}).`);
  }
}

async function listen(server: Server, { port, host }: Settings): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    server.once('error', (error) => reject(whyNotListening(error, port, host)));
    server.listen(port, host, resolve);
  });
}

function whyNotListening(error: Error & { code?: string }, port: number, host: string): Error {
  switch (error.code) {
    case 'EADDRINUSE':
      return new CannotStart(
        `Port ${port} is taken by another program. Stop that, or choose another: PORT=${port + 1}.`,
      );
    case 'EACCES':
      return new CannotStart(
        `Port ${port} needs special rights. Choose one above 1023, for example PORT=4280.`,
      );
    case 'EADDRNOTAVAIL':
    case 'ENOTFOUND':
      return new CannotStart(`HOST=${host} is not an address of this computer. Use 0.0.0.0 for all of them.`);
    default:
      return error;
  }
}

function addressOf(server: Server, settings: Settings): string {
  const { port } = server.address() as AddressInfo;
  const everywhere = settings.host === '0.0.0.0' || settings.host === '::';
  return `${settings.tls ? 'https' : 'http'}://${everywhere ? 'localhost' : settings.host}:${port}`;
}

async function shutDown(server: Server, opened: { deps: Deps; close(): Promise<void> }): Promise<void> {
  const stopped = new Promise<void>((resolve) => server.close(() => resolve()));
  await opened.deps.post.close();
  await opened.deps.writer.close();
  opened.deps.feed.end();
  server.closeIdleConnections();
  const patience = setTimeout(() => server.closeAllConnections(), GRACE);
  await stopped;
  clearTimeout(patience);
  await opened.close();
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
