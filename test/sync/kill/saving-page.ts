/** Runs in the browser: taps without end by the application's own outbox, and says what was saved once it is. */
import { newId } from '../../../src/app/core/ids';
import { stampDraft } from '../../../src/app/offline/entry-draft';
import { LocalDatabase } from '../../../src/app/offline/local-database';
import { Outbox } from '../../../src/app/offline/outbox';
import { OutboxCopy } from '../../../src/app/offline/outbox-copy';

const database = new LocalDatabase(indexedDB);
const outbox = new Outbox(database);
const copy = new OutboxCopy();

async function tapForEver(): Promise<void> {
  const stamp = {
    shedId: 'north',
    by: 'wanda',
    grantId: 'grant',
    deviceId: 'tablet',
    clock: undefined,
    newId,
    steppedSince: () => false,
  };
  for (;;) {
    const draft = { kind: 'stop', loomId: 'n1', cause: 'warp-break', count: 1 } as const;
    const [record] = await outbox.append([stampDraft(draft, { ...stamp, now: Date.now() })]);
    if (record) await copy.keep([record]);
    // From here on the person sees it as saved.
    void fetch('/shown', { method: 'POST', body: JSON.stringify(record?.entry) });
  }
}

async function tellAll(): Promise<void> {
  const entries = (await outbox.all()).map(({ entry }) => entry);
  await fetch('/kept', { method: 'POST', body: JSON.stringify(entries) });
}

// As the application starts.
void copy.recoverInto(database).then((recovered) => {
  if (recovered > 0) void fetch('/recovered', { method: 'POST', body: String(recovered) });
  return location.pathname === '/tap' ? tapForEver() : tellAll();
});
