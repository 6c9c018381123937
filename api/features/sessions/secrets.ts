import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';

/** 256 bits from the operating system, safe in a cookie. */
export function newSecret(): string {
  return randomBytes(32).toString('base64url');
}

/** SHA-256: enough for secrets that are random already; passwords and PINs take bcrypt. */
export function hashOfSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}

/** Compares in constant time. */
export function isSecretOf(secret: string, hash: string | null): boolean {
  if (hash === null) return false;
  const given = Buffer.from(hashOfSecret(secret));
  const kept = Buffer.from(hash);
  return given.length === kept.length && timingSafeEqual(given, kept);
}
