import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';
import { seeded } from '../faulty-wire';

interface Kept {
  readonly id: string;
  readonly deviceSeq: number;
}

export interface BrowserKills {
  kills: number;
  entries: number;
  /** Shown as saved, and not on the device after the kill. */
  lost: number;
  /** Two entries of one number. */
  doubled: number;
  /** How often the browser found its IndexedDB damaged and deleted it, and the second copy stood in. */
  recovered: number;
}

/** After every so many kills a byte of the browser's own file is changed, as a write torn by a kill may leave it. */
const DAMAGED = 10;
/** Saving goes on for at most so long before the kill, ms. */
const SAVING = 400;

/** Kills a real Chromium with SIGKILL while the application's outbox saves, and looks what its disk kept. */
export async function killBrowsers(kills: number, seed: number, chromium: string): Promise<BrowserKills> {
  const profile = mkdtempSync(join(tmpdir(), 'shedbeat-chromium-'));
  const site = await SavingSite.start();
  const random = seeded(seed);
  try {
    for (let n = 0; n < kills; n++) {
      const before = site.shown.size;
      const browser = open(chromium, profile, `${site.url}/tap`);
      while (site.shown.size === before) await wait(10);
      await wait(random() * SAVING);
      await kill(browser);
      if (n % DAMAGED === DAMAGED - 1) damage(profile);
    }
    const browser = open(chromium, profile, `${site.url}/look`);
    const kept = await site.kept;
    await kill(browser);
    const ids = new Set(kept.map(({ id }) => id));
    return {
      kills,
      entries: site.shown.size,
      lost: [...site.shown].filter((id) => !ids.has(id)).length,
      doubled: kept.length - new Set(kept.map(({ deviceSeq }) => deviceSeq)).size,
      recovered: site.recovered,
    };
  } finally {
    await site.close();
    rmSync(profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 200 });
  }
}

function damage(profile: string): void {
  const folder = join(profile, 'Default/IndexedDB');
  for (const name of readdirSync(folder, { recursive: true, encoding: 'utf8' })) {
    if (!name.endsWith('.log')) continue;
    const file = join(folder, name);
    const bytes = readFileSync(file);
    const place = bytes.length >> 1;
    bytes[place] = (bytes[place] ?? 0) ^ 0xff;
    writeFileSync(file, bytes);
  }
}

/** A page with the application's outbox, and the memory of what it showed as saved. */
class SavingSite {
  readonly shown = new Set<string>();
  recovered = 0;
  private tellKept: (kept: Kept[]) => void = () => undefined;
  readonly kept = new Promise<Kept[]>((resolve) => (this.tellKept = resolve));

  private constructor(private readonly server: Server) {}

  static async start(): Promise<SavingSite> {
    const script = await bundled();
    const server = createServer();
    const site = new SavingSite(server);
    server.on('request', (request, response) => {
      if (request.method === 'GET') {
        response.setHeader('content-type', request.url === '/page.js' ? 'text/javascript' : 'text/html');
        response.end(request.url === '/page.js' ? script : '<!doctype html><script src="/page.js"></script>');
        return;
      }
      let text = '';
      request.setEncoding('utf8').on('data', (part: string) => (text += part));
      request.on('end', () => {
        if (request.url === '/shown') site.shown.add((JSON.parse(text) as Kept).id);
        else if (request.url === '/recovered') site.recovered++;
        else site.tellKept(JSON.parse(text) as Kept[]);
        response.end();
      });
    });
    server.listen(0, '127.0.0.1');
    await once(server, 'listening');
    return site;
  }

  get url(): string {
    return `http://127.0.0.1:${(this.server.address() as AddressInfo).port}`;
  }

  async close(): Promise<void> {
    this.server.closeAllConnections();
    this.server.close();
    await once(this.server, 'close');
  }
}

async function bundled(): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: [fileURLToPath(new URL('./saving-page.ts', import.meta.url))],
    tsconfig: fileURLToPath(new URL('../tsconfig.run.json', import.meta.url)),
    bundle: true,
    write: false,
    format: 'esm',
    target: 'es2022',
  });
  return outputFiles[0]?.text ?? '';
}

function open(chromium: string, profile: string, url: string): ChildProcess {
  const flags = [
    '--headless=new',
    '--no-sandbox',
    '--disable-gpu',
    '--no-first-run',
    '--disable-dev-shm-usage',
  ];
  return spawn(chromium, [...flags, `--user-data-dir=${profile}`, url], { stdio: 'ignore', detached: true });
}

/** The browser and the processes that it started, at once: they are a group of their own. */
async function kill(child: ChildProcess): Promise<void> {
  const gone = once(child, 'exit');
  if (child.pid === undefined) throw new Error('The browser did not start.');
  process.kill(-child.pid, 'SIGKILL');
  await gone;
}
