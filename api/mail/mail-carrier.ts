import { createTransport } from 'nodemailer';
import type { MailForm } from '../../shared/contract/set-up.js';

/** A letter as it is carried. */
export interface MailMessage {
  readonly id: string;
  readonly from: { readonly name: string; readonly address: string };
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  /** Milliseconds since 1970. */
  readonly at: number;
}

/** How a mail server is reached. */
export interface MailServer extends Pick<MailForm, 'port' | 'security' | 'user'> {
  readonly host: string;
  readonly password: string | null;
}

/** What takes letters away. One call is one conversation with the mail server; it rejects as that says. */
export interface MailCarrier {
  carry(message: MailMessage, server: MailServer): Promise<void>;
}

/** Real time: a mail server that says nothing must not hold the post for longer. */
const PATIENCE = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 20_000 } as const;

export interface SmtpOptions {
  /** Certificates to trust beside the known ones (PEM). A mill's own authority is named by NODE_EXTRA_CA_CERTS. */
  readonly ca?: string;
  readonly patience?: Readonly<Record<keyof typeof PATIENCE, number>>;
}

/** SMTP. With `starttls` nothing is said to a server that will not encrypt, `none` encrypts nothing. */
export function smtpCarrier({ ca, patience = PATIENCE }: SmtpOptions = {}): MailCarrier {
  return {
    carry: async (message, { host, port, security, user, password }) => {
      const transport = createTransport({
        ...patience,
        host,
        port,
        secure: security === 'tls',
        requireTLS: security === 'starttls',
        ignoreTLS: security === 'none',
        ...(user === '' ? {} : { auth: { user, pass: password ?? '' } }),
        ...(ca === undefined ? {} : { tls: { ca } }),
      });
      try {
        await transport.sendMail(asMail(message));
      } finally {
        transport.close();
      }
    },
  };
}

/** The letter as a file that any mail program opens (RFC 5322). */
export async function asEml(message: MailMessage): Promise<Buffer> {
  const transport = createTransport({ streamTransport: true, buffer: true, newline: 'windows' });
  const sent = await transport.sendMail(asMail(message));
  return Buffer.isBuffer(sent.message) ? sent.message : Buffer.from('');
}

/** Sent twice after a crash between the two, a letter has the same Message-ID, and mail programs show it once. */
function asMail({ id, from, to, subject, text, html, at }: MailMessage) {
  return {
    from: { ...from },
    to,
    subject,
    text,
    html,
    date: new Date(at),
    messageId: `<${id}@${from.address.split('@')[1] ?? 'localhost'}>`,
    headers: { 'Auto-Submitted': 'auto-generated' },
  };
}
