import type { EntityManager } from 'typeorm';
import { MailSettingsRow } from '../../database/entities/index.js';
import type { Settings } from '../../settings.js';

/** What a mill has that never set up mail. */
export const NO_MAIL: Omit<MailSettingsRow, 'baseUrl'> = {
  id: 1,
  host: null,
  port: 587,
  security: 'starttls',
  user: '',
  password: null,
  from: '',
};

/**
 * Keeps the address under which a signed-in manager works here, for links in letters; not the server's own name for
 * itself where a better one is known, and nothing where PUBLIC_ORIGIN says it.
 */
export async function rememberAddress(
  tx: EntityManager,
  settings: Pick<Settings, 'publicOrigins'>,
  address: string,
): Promise<void> {
  if (settings.publicOrigins.length > 0) return;
  const known = await tx.getRepository(MailSettingsRow).findOneBy({ id: 1 });
  if (known?.baseUrl != null && isOwnComputer(address) && !isOwnComputer(known.baseUrl)) return;
  if (known) await tx.getRepository(MailSettingsRow).update({ id: 1 }, { baseUrl: address });
  else await tx.getRepository(MailSettingsRow).insert({ ...NO_MAIL, baseUrl: address });
}

function isOwnComputer(address: string): boolean {
  return /^https?:\/\/(localhost|127\.|\[::1\])/.test(address);
}
