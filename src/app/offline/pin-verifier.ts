/** PBKDF2 with SHA-256 at the count that OWASP's cheat sheet gave for it in 2022; later counts may rise. */
export const PIN_ITERATIONS = 310_000;

/** What a device keeps to check a PIN without network. It gates the screen: six digits can be broken by force. */
export interface PinVerifier {
  readonly salt: Uint8Array<ArrayBuffer>;
  readonly iterations: number;
  readonly hash: Uint8Array<ArrayBuffer>;
}

/** WebCrypto needs a secure context: HTTPS, or localhost. */
export function canVerifyPins(): boolean {
  return globalThis.crypto?.subtle !== undefined;
}

export async function makeVerifier(pin: string, iterations = PIN_ITERATIONS): Promise<PinVerifier> {
  const salt = crypto.getRandomValues(new Uint8Array(16));
  return { salt, iterations, hash: await derive(pin, salt, iterations) };
}

export async function pinMatches(pin: string, verifier: PinVerifier): Promise<boolean> {
  const hash = await derive(pin, verifier.salt, verifier.iterations);
  let differing = hash.length ^ verifier.hash.length;
  for (let i = 0; i < hash.length; i++) differing |= (hash[i] ?? 0) ^ (verifier.hash[i] ?? 0);
  return differing === 0;
}

async function derive(
  pin: string,
  salt: Uint8Array<ArrayBuffer>,
  iterations: number,
): Promise<Uint8Array<ArrayBuffer>> {
  const key = await crypto.subtle.importKey('raw', new TextEncoder().encode(pin), 'PBKDF2', false, [
    'deriveBits',
  ]);
  const bits = await crypto.subtle.deriveBits(
    { name: 'PBKDF2', hash: 'SHA-256', salt, iterations },
    key,
    256,
  );
  return new Uint8Array(bits);
}
