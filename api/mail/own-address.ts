import type { MailSettingsRow } from '../database/entities/index.js';
import type { Settings } from '../settings.js';

/**
 * What links in letters begin with: PUBLIC_ORIGIN, or else the address under which a manager last looked after mail
 * or people. Never what an unknown request names as its host: a stranger could have letters point at his own.
 */
export function ownAddress(
  { publicOrigins, tls, port }: Pick<Settings, 'publicOrigins' | 'tls' | 'port'>,
  mail: Pick<MailSettingsRow, 'baseUrl'> | null,
): string {
  return publicOrigins[0] ?? mail?.baseUrl ?? `${tls ? 'https' : 'http'}://localhost:${port}`;
}
