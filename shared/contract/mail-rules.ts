import * as z from 'zod/mini';
import { emailSchema } from './session.js';
import type { MailForm } from './set-up.js';

export type MailField = 'host' | 'user' | 'from';

/** A host name or an IP address, without scheme, port or path. */
const HOST =
  /^(?=.{1,253}$)([a-z0-9]([a-z0-9-]{0,61}[a-z0-9])?)(\.[a-z0-9]([a-z0-9-]{0,61}[a-z0-9])?)*\.?$|^\[?[0-9a-f:]+\]?$/i;

/**
 * What is wrong with mail settings beyond each field's own shape, with what would be right. No host is no server:
 * the rest may then be empty. `hasPassword`: one is kept, or typed now.
 */
export function mailTroubles(
  form: Pick<MailForm, 'host' | 'user' | 'from'>,
  hasPassword: boolean,
): Partial<Record<MailField, string>> {
  const troubles: Partial<Record<MailField, string>> = {};
  if (form.host === '') return troubles;
  if (!HOST.test(form.host))
    troubles.host =
      'A server’s name alone, such as smtp.mill.example, without https:// and without the port.';
  if (!z.safeParse(emailSchema, form.from).success)
    troubles.from = 'The e-mail address that letters come from, such as shedbeat@mill.example.';
  if (form.user === '' && hasPassword)
    troubles.user = 'A password goes with a user. Enter the user, or empty the password.';
  return troubles;
}
