import { createSecretKey, type KeyObject } from 'node:crypto';
import { chmodSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import jwt from 'jsonwebtoken';
import { LIMITS } from '../../../shared/contract/limits.js';
import { CannotStart } from '../../cannot-start.js';
import { newSecret } from './secrets.js';

/** What an access token says. The rest is read from the database at each request. */
export interface AccessClaims {
  /** Person; null: a tablet with nobody signed in. */
  readonly personId: string | null;
  readonly sessionId: string | null;
  readonly deviceId: string;
  /** The refresh token it came with: its first use retires that token's predecessor. */
  readonly refreshId: string | null;
}

export type ReadToken = { readonly claims: AccessClaims } | { readonly problem: 'bad-token' | 'expired' };

const ALGORITHM = 'HS256';
const ISSUER = 'shedbeat';

/** Makes and reads access tokens: JWT, algorithm pinned, 15 minutes. */
export class AccessTokens {
  /** A key object: from a string the library tries a public key first, at each request, at a millisecond's cost. */
  private readonly key: KeyObject;

  constructor(
    secret: string,
    private readonly now: () => number,
  ) {
    this.key = createSecretKey(secret, 'utf8');
  }

  issue(claims: AccessClaims): { token: string; expiresAt: number } {
    const iat = Math.floor(this.now() / 1000);
    const exp = iat + LIMITS.accessTokenSeconds;
    const token = jwt.sign(
      { sub: claims.personId, sid: claims.sessionId, did: claims.deviceId, rid: claims.refreshId, iat, exp },
      this.key,
      { algorithm: ALGORITHM, issuer: ISSUER },
    );
    return { token, expiresAt: exp * 1000 };
  }

  read(token: string): ReadToken {
    try {
      const payload = jwt.verify(token, this.key, {
        algorithms: [ALGORITHM],
        issuer: ISSUER,
        clockTimestamp: Math.floor(this.now() / 1000),
      });
      const claims = typeof payload === 'string' ? null : claimsOf({ ...payload });
      return claims ? { claims } : { problem: 'bad-token' };
    } catch (error) {
      return { problem: error instanceof jwt.TokenExpiredError ? 'expired' : 'bad-token' };
    }
  }
}

function claimsOf(payload: Record<string, unknown>): AccessClaims | null {
  const { sub, sid, did, rid, exp } = payload;
  if (typeof did !== 'string' || typeof exp !== 'number') return null;
  if (!isTextOrNull(sub) || !isTextOrNull(sid) || !isTextOrNull(rid)) return null;
  return { personId: sub, sessionId: sid, deviceId: did, refreshId: rid };
}

function isTextOrNull(value: unknown): value is string | null {
  return value === null || typeof value === 'string';
}

/** The secret that signs access tokens: made at the first start, readable by the server's user alone. */
export function readTokenSecret(dataDir: string): string {
  const file = join(dataDir, 'token-secret');
  try {
    writeFileSync(file, newSecret(), { flag: 'wx', mode: 0o600 });
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
  }
  chmodSync(file, 0o600);
  const secret = readFileSync(file, 'utf8').trim();
  if (secret.length < 32)
    throw new CannotStart(
      `${file} is cut short. Delete it and start again: a new one is made, and everybody signs in once more.`,
    );
  return secret;
}
