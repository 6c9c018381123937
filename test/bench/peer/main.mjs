/**
 * npm run bench:peer: this application's sync against the general-purpose pair pouchdb and express-pouchdb, in one run
 * on one machine: so many entries, one a request, every tenth answer lost. Both keep the client's side in memory and the
 * server's on the disk (ours flushes each commit, theirs does not). `asShipped`: each waits after a failure as it does by
 * default; `atOnce`: nobody waits, which shows the work alone.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { performance } from 'node:perf_hooks';
import { measureOurs } from '../../sync/bench/ours.ts';
import { seeded } from '../../sync/faulty-wire.ts';

const require = createRequire(import.meta.url);
const COUNT = Number(process.argv[2] ?? 1_000);
const LOST = 0.1;

/** Loses that share of the answers, after the server has acted. */
function losing(share) {
  const random = seeded(1);
  return (fetch) => async (input, init) => {
    const response = await fetch(input, init);
    if (random() >= share) return response;
    await response.arrayBuffer();
    throw new TypeError('Failed to fetch');
  };
}

async function measurePeer(count, wire, waits) {
  const express = require('express');
  const PouchDB = require('pouchdb');
  PouchDB.plugin(require('pouchdb-adapter-memory'));
  const folder = mkdtempSync(path.join(tmpdir(), 'shedbeat-peer-'));
  const Served = PouchDB.defaults({ prefix: `${folder}/` });
  const app = express();
  app.use(
    '/',
    require('express-pouchdb')(Served, { mode: 'minimumForPouchDB', logPath: `${folder}/log.txt` }),
  );
  const server = createServer(app);
  await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${server.address().port}/book`;
  let requests = 0;
  const lossy = wire(PouchDB.fetch);
  const fetch = (input, init) => {
    requests += 1;
    return lossy(input, init);
  };
  const local = new PouchDB('tablet', { adapter: 'memory' });
  const remote = new PouchDB(url, { fetch, skip_setup: true });
  await new Served('book').info();
  await local.bulkDocs(
    Array.from({ length: count }, (_, n) => ({ _id: `entry-${n}`, cause: 'warp-break', count: 1 })),
  );
  const began = performance.now();
  if (waits) {
    // As its documentation says for an unreliable network; it waits after failures by its own default.
    const live = local.replicate.to(remote, { batch_size: 1, batches_limit: 1, live: true, retry: true });
    const served = new Served('book');
    while ((await served.info()).doc_count < count) await wait(50);
    live.cancel();
    await live.catch(() => undefined);
  } else
    for (;;) {
      try {
        const done = await local.replicate.to(remote, { batch_size: 1, batches_limit: 1 });
        if (done.ok && done.errors.length === 0) break;
      } catch {
        // Tried again at once.
      }
    }
  const seconds = (performance.now() - began) / 1_000;
  const { doc_count: stored } = await new Served('book').info();
  server.closeAllConnections();
  server.close();
  await local.destroy();
  rmSync(folder, { recursive: true, force: true });
  return { requests, seconds, stored };
}

async function both(waits) {
  const ours = await measureOurs(COUNT, losing(LOST), waits);
  const peer = await measurePeer(COUNT, losing(LOST), waits);
  return { ours, peer, timeRatio: ours.seconds / peer.seconds };
}

const sound = await measureOurs(COUNT, losing(0), false);
const atOnce = await both(false);
const asShipped = await both(true);
const requestRatio = atOnce.ours.requests / sound.requests;
const stored = atOnce.ours.stored + asShipped.ours.stored;
const well = stored === 2 * COUNT && requestRatio <= 1.2 && asShipped.timeRatio <= 0.2;
console.log(JSON.stringify({ count: COUNT, lost: LOST, sound, requestRatio, atOnce, asShipped, well }));
process.exit(well ? 0 : 1);
