import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { cpSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import Database from 'better-sqlite3';
import { bookFile, prepareDatabase } from '../../../api/database/prepare-database.js';
import { openDeps } from '../../../api/open-deps.js';
import { TEST_ORIGIN, TEST_PEOPLE, TEST_SETTINGS } from '../../../api/testing/test-server.js';
import { seeded } from '../faulty-wire';
import { FaultTablet } from '../faults/fault-tablet';
import { NO_SABOTAGE } from '../faults/sabotage';
import { noPasswords, tabletId } from '../faults/template-mill';
import { judgeRun } from '../faults/verdict';

const MAIN = fileURLToPath(new URL('../../../dist/server/api/main.js', import.meta.url));
const TAPS = 20;
/** A push takes about so long, ms: kills fall before, in and after its commit. */
const PUSH = 60;

export interface ServerKills {
  kills: number;
  /** Kills while a push was under way. */
  midPush: number;
  entries: number;
  lost: number;
  doubled: number;
  misattributed: number;
  unseen: number;
  unsound: number;
  details: readonly string[];
}

/** Kills the built server with SIGKILL in the middle of pushes, so many times; it starts again on what lies there. */
export async function killServers(kills: number, seed: number, template: string): Promise<ServerKills> {
  const dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-kill-'));
  cpSync(template, dataDir, { recursive: true });
  const random = seeded(seed);
  const port = await freePort();
  const tablet = new FaultTablet({
    id: tabletId(0),
    faults: [],
    url: () => `http://127.0.0.1:${port}`,
    now: Date.now,
    clockError: 0,
    sabotage: NO_SABOTAGE,
  });
  const log = async (): Promise<void> => {
    for (let n = 0; n < TAPS; n++)
      await tablet.log(TEST_PEOPLE.weaver.id, { kind: 'stop', loomId: 'n1', cause: 'warp-break', count: 1 });
  };
  let midPush = 0;
  let unsound = 0;
  try {
    for (let n = 0; n < kills; n++) {
      const server = await start(dataDir, port);
      // Renews the token and sends what the last kill left, so that the next push is under way when it is killed.
      await tablet.exchange();
      await log();
      let done = false;
      const exchange = tablet.exchange().finally(() => (done = true));
      await wait(random() * PUSH);
      if (!done) midPush++;
      await kill(server);
      await exchange;
      if (!isSound(dataDir)) unsound++;
    }
    const server = await start(dataDir, port);
    for (let tries = 0; tries < 10 && !(await tablet.exchange()); tries++) await wait(100);
    await tablet.exchange();
    server.kill('SIGTERM');
    await once(server, 'exit');
    const opened = await openDeps({ ...TEST_SETTINGS, dataDir }, { passwords: noPasswords });
    const verdict = await judgeRun(opened.deps, [tablet], { faults: kills, stuck: false });
    await opened.close();
    const { entries, lost, doubled, misattributed, unseen, details } = verdict;
    return { kills, midPush, entries, lost, doubled, misattributed, unseen, unsound, details };
  } finally {
    rmSync(dataDir, { recursive: true, force: true });
  }
}

/** Kills cannot show that a commit is not flushed: the pragma itself is read. 2 is FULL. */
export async function synchronousOf(template: string): Promise<number> {
  const dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-kill-'));
  cpSync(template, dataDir, { recursive: true });
  const { writing, close } = await prepareDatabase(dataDir);
  const [row] = await writing.query<{ synchronous: number }[]>('PRAGMA synchronous');
  await close();
  rmSync(dataDir, { recursive: true, force: true });
  return row?.synchronous ?? -1;
}

async function start(dataDir: string, port: number): Promise<ChildProcess> {
  const env = {
    ...process.env,
    NODE_OPTIONS: '',
    DATA_DIR: dataDir,
    PORT: String(port),
    HOST: '127.0.0.1',
    APP_DIR: '',
    PUBLIC_ORIGIN: TEST_ORIGIN,
    LOG_LEVEL: 'silent',
    BACKUP_HOUR: 'off',
  };
  const child = spawn(process.execPath, [MAIN], { env, stdio: ['ignore', 'pipe', 'inherit'] });
  await Promise.race([once(child.stdout, 'data'), once(child, 'exit').then(() => Promise.reject(ended()))]);
  child.stdout.resume();
  return child;
}

function ended(): Error {
  return new Error('The server did not start.');
}

async function kill(child: ChildProcess): Promise<void> {
  const gone = once(child, 'exit');
  child.kill('SIGKILL');
  await gone;
}

function isSound(dataDir: string): boolean {
  const database = new Database(bookFile(dataDir));
  const said = database.pragma('integrity_check', { simple: true });
  database.close();
  return said === 'ok';
}

async function freePort(): Promise<number> {
  const probe = createServer();
  probe.listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return port;
}
