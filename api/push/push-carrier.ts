import { lookup } from 'node:dns';
import { Agent } from 'node:https';
import { BlockList, isIP, type LookupFunction } from 'node:net';
import webpush, { WebPushError } from 'web-push';

export interface VapidKeys {
  readonly publicKey: string;
  readonly privateKey: string;
  /** Whom a push service may ask about us: a https or mailto address. */
  readonly subject: string;
}

export interface PushAddress {
  readonly endpoint: string;
  readonly p256dh: string;
  readonly auth: string;
}

/** `gone`: the browser has ended the subscription. `failed`: not this time. */
export type Delivery = 'sent' | 'gone' | 'failed';

/** What word of calls leaves by. */
export interface PushCarrier {
  /** Whether the address is one that the server goes to at all. */
  takes(endpoint: string): boolean;
  send(keys: VapidKeys, to: PushAddress, payload: string): Promise<Delivery>;
}

export interface WebPushOptions {
  /** For tests: the one host (with port) that is taken instead of push services in the wide world. */
  readonly onlyHost?: string;
  readonly agent?: Agent;
}

/** A call that was not heard of within ten minutes is old news: the page tells of it. */
const LASTS = 10 * 60;
const PATIENCE = 10_000;

/** Web push (RFC 8030, 8291, 8292): HTTPS to whichever push service the browser has chosen. */
export function webPushCarrier({ onlyHost, agent = publicAgent() }: WebPushOptions = {}): PushCarrier {
  return {
    takes: (endpoint) => {
      const url = URL.canParse(endpoint) ? new URL(endpoint) : null;
      if (url?.protocol !== 'https:' || url.username !== '' || url.password !== '') return false;
      return onlyHost === undefined ? isPublicName(url) : url.host === onlyHost;
    },
    send: async ({ subject, publicKey, privateKey }, { endpoint, p256dh, auth }, payload) => {
      try {
        await webpush.sendNotification({ endpoint, keys: { p256dh, auth } }, payload, {
          vapidDetails: { subject, publicKey, privateKey },
          TTL: LASTS,
          urgency: 'high',
          timeout: PATIENCE,
          agent,
        });
        return 'sent';
      } catch (error) {
        const gone = error instanceof WebPushError && (error.statusCode === 404 || error.statusCode === 410);
        return gone ? 'gone' : 'failed';
      }
    },
  };
}

/** A subscription comes from a browser: it must not make the server speak to machines of the mill's own network. */
function isPublicName({ hostname, port }: URL): boolean {
  if (port !== '' || isIP(hostname.replace(/^\[|\]$/g, '')) !== 0) return false;
  return /\.[a-z]{2,}$/i.test(hostname) && !/\.(local|localhost|internal|lan|home|arpa)$/i.test(hostname);
}

const OWN_NETWORKS = new BlockList();
for (const [network, prefix] of [
  ['0.0.0.0', 8],
  ['10.0.0.0', 8],
  ['100.64.0.0', 10],
  ['127.0.0.0', 8],
  ['169.254.0.0', 16],
  ['172.16.0.0', 12],
  ['192.168.0.0', 16],
] as const)
  OWN_NETWORKS.addSubnet(network, prefix, 'ipv4');
for (const [network, prefix] of [
  ['::', 127],
  ['fc00::', 7],
  ['fe80::', 10],
] as const)
  OWN_NETWORKS.addSubnet(network, prefix, 'ipv6');

/** Whether an address lies in the wide world. */
export function isPublicAddress(address: string, family: number): boolean {
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address)?.[1];
  if (mapped !== undefined) return !OWN_NETWORKS.check(mapped, 'ipv4');
  return !OWN_NETWORKS.check(address, family === 6 ? 'ipv6' : 'ipv4');
}

/** A public name that leads to an address of the own network is not gone to either. */
function publicAgent(): Agent {
  const publicOnly: LookupFunction = (hostname, options, callback) => {
    lookup(hostname, { ...options, all: true }, (error, addresses) => {
      if (error) return callback(error, []);
      const found = addresses.filter(({ address, family }) => isPublicAddress(address, family));
      const [first] = found;
      if (!first)
        return callback(Object.assign(new Error(`${hostname} is not public`), { code: 'ENOTFOUND' }), []);
      if (options.all) callback(null, found);
      else callback(null, first.address, first.family);
    });
  };
  return new Agent({ lookup: publicOnly, keepAlive: false });
}
