import type { MailServer } from './mail-carrier.js';

/** Why a letter did not go out. */
export interface MailTrouble {
  /** What happened, with the mail server's own words, and what to do. */
  readonly sentence: string;
  /** Whether another try can make sense without anybody changing the letter. */
  readonly again: boolean;
}

interface SmtpError {
  readonly code?: unknown;
  readonly command?: unknown;
  readonly responseCode?: unknown;
  readonly response?: unknown;
  readonly message?: unknown;
}

/** Reads what went wrong in a conversation with a mail server. */
export function mailTroubleOf(error: unknown, { host, port, user }: MailServer): MailTrouble {
  const { code, command, responseCode, response, message } = (error ?? {}) as SmtpError;
  const said = oneLine(response ?? message);
  const where = `${host}:${port}`;
  const status = typeof responseCode === 'number' ? responseCode : 0;
  if (code === 'EAUTH' || status === 530 || status === 535)
    return {
      again: true,
      sentence:
        user === ''
          ? `${where} takes letters only from whoever signs in (it said “${said}”). Enter user and password.`
          : `${where} does not take this user and password (it said “${said}”). Type both again; many providers want an app password instead of your own.`,
    };
  if (code === 'ETLS' || command === 'STARTTLS')
    return {
      again: true,
      sentence: `${where} does not encrypt when asked to (it said “${said}”). Choose TLS with port 465; “none” sends passwords readable.`,
    };
  const unreachable = connectionTrouble(said, host, port);
  if (status === 0 && unreachable) return { again: true, sentence: unreachable };
  if (status === 0)
    return {
      again: true,
      sentence: `The conversation with ${where} broke off (“${said}”). Check server, port and security.`,
    };
  // 4xx: not now; 5xx: not at all (RFC 5321, 4.2.1).
  if (status < 500)
    return { again: true, sentence: `${where} cannot take it now (it said “${said}”). It is tried again.` };
  if (typeof command === 'string' && command.startsWith('MAIL'))
    return {
      again: false,
      sentence: `${where} does not let this server send from its sender’s address (it said “${said}”). Enter as sender an address that belongs to the user.`,
    };
  if (typeof command === 'string' && command.startsWith('RCPT'))
    return {
      again: false,
      sentence: `${where} does not take letters to this address (it said “${said}”). Check the address.`,
    };
  return { again: false, sentence: `${where} refused the letter (it said “${said}”).` };
}

function connectionTrouble(said: string, host: string, port: number): string | null {
  if (/ECONNREFUSED/.test(said))
    return `Nothing answers at ${host} on port ${port}. Check the port: 465 goes with TLS, 587 with STARTTLS, 25 with none; or a firewall stands between.`;
  if (/ENOTFOUND|EAI_AGAIN/.test(said))
    return `There is no server by the name ${host}, as far as can be found from here. Check how it is written, and whether this computer has a network.`;
  if (/EHOSTUNREACH|ENETUNREACH/.test(said))
    return `There is no way from this computer to ${host}. Check the network.`;
  if (/wrong version number|packet length too long/i.test(said))
    return `The server at ${host}:${port} does not begin with TLS. Choose STARTTLS, or another port: 465 goes with TLS.`;
  if (/certificate|altnames|self.signed|unable to (get|verify)/i.test(said))
    return `The certificate of ${host} is not one that this computer trusts (“${said}”). Enter the server’s name as its certificate has it; for a certificate of the mill’s own, start the server with NODE_EXTRA_CA_CERTS.`;
  if (/timeout|timed out|ETIMEDOUT|greeting never/i.test(said))
    return `${host}:${port} does not answer in time. Check port and security: 465 goes with TLS, 587 with STARTTLS; or a firewall stands between.`;
  return null;
}

function oneLine(words: unknown): string {
  const text = typeof words === 'string' ? words : 'nothing';
  return text.replace(/\s+/g, ' ').trim().slice(0, 300);
}
