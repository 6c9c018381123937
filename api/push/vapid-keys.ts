import webpush from 'web-push';
import { MetaRow } from '../database/entities/index.js';
import type { Deps } from '../deps.js';
import type { VapidKeys } from './push-carrier.js';

const KEY = 'vapid';

/**
 * The book's own pair of keys for web push, made at the first start and kept in it: browsers subscribe to this public
 * key, so another pair would end every subscription.
 */
export async function vapidKeys({
  reads,
  writer,
  settings,
}: Pick<Deps, 'reads' | 'writer' | 'settings'>): Promise<VapidKeys> {
  const known = await reads.manager.findOneBy(MetaRow, { key: KEY });
  const pair = known?.value ?? (await writer.write((tx) => makeOnce(tx)));
  const { publicKey, privateKey } = JSON.parse(pair) as Pick<VapidKeys, 'publicKey' | 'privateKey'>;
  const subject = settings.publicOrigins.find((origin) => origin.startsWith('https:')) ?? NOBODY;
  return { publicKey, privateKey, subject };
}

/** A mill without a public name has no address to give. */
const NOBODY = 'mailto:nobody@shedbeat.example';

async function makeOnce(tx: Parameters<Parameters<Deps['writer']['write']>[0]>[0]): Promise<string> {
  const meanwhile = await tx.findOneBy(MetaRow, { key: KEY });
  if (meanwhile) return meanwhile.value;
  const value = JSON.stringify(webpush.generateVAPIDKeys());
  await tx.insert(MetaRow, { key: KEY, value });
  return value;
}
