import { readFileSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

/** A letter as it arrived. */
export interface ArrivedLetter {
  readonly from: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly messageId: string;
  /** Whether the conversation was encrypted, and who had signed in. */
  readonly secure: boolean;
  readonly user: string | null;
}

export interface MailServerOptions {
  readonly security?: 'tls' | 'starttls' | 'none';
  /** Only who signs in so may send; absent: everybody. */
  readonly account?: { readonly user: string; readonly password: string };
}

/** What the mail server says of the next letters instead of taking them, e.g. `{ at: 'rcpt', code: 450, … }`. */
export interface Refusal {
  readonly at: 'mail' | 'rcpt' | 'data';
  readonly code: number;
  readonly words: string;
}

export const TEST_CERT = readFileSync(new URL('./tls/test-cert.pem', import.meta.url), 'utf8');
const TEST_KEY = readFileSync(new URL('./tls/test-key.pem', import.meta.url), 'utf8');

/** A real mail server on this computer: speaks SMTP, keeps what arrives, refuses what it is told to. */
export class TestMailServer {
  readonly arrived: ArrivedLetter[] = [];
  /** In force until it is set to null. */
  refusal: Refusal | null = null;

  private constructor(private readonly server: SMTPServer) {}

  static async start({ security = 'none', account }: MailServerOptions = {}): Promise<TestMailServer> {
    const refuse = (at: Refusal['at']): Error | null => {
      const { refusal } = mail;
      if (refusal?.at !== at) return null;
      return Object.assign(new Error(refusal.words), { responseCode: refusal.code });
    };
    const server = new SMTPServer({
      secure: security === 'tls',
      ...(security === 'none' ? { disabledCommands: ['STARTTLS'] } : { key: TEST_KEY, cert: TEST_CERT }),
      authOptional: account === undefined,
      allowInsecureAuth: true,
      onAuth: (auth, _session, done) =>
        auth.username === account?.user && auth.password === account?.password
          ? done(null, { user: auth.username })
          : done(new Error('Invalid username or password')),
      onMailFrom: (_address, _session, done) => done(refuse('mail')),
      onRcptTo: (_address, _session, done) => done(refuse('rcpt')),
      onData: (stream, session, done) => {
        simpleParser(stream).then((parsed) => {
          const refused = refuse('data');
          if (!refused)
            mail.arrived.push({
              from: parsed.from?.text ?? '',
              to: session.envelope.rcptTo.map(({ address }) => address).join(', '),
              subject: parsed.subject ?? '',
              text: parsed.text ?? '',
              html: parsed.html || '',
              messageId: parsed.messageId ?? '',
              secure: session.secure,
              user: session.user || null,
            });
          done(refused);
        }, done);
      },
    });
    // A conversation that a client broke off is an error to the server, and what some tests are about.
    server.on('error', () => undefined);
    const mail = new TestMailServer(server);
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
    return mail;
  }

  get port(): number {
    return (this.server.server.address() as AddressInfo).port;
  }

  async close(): Promise<void> {
    await new Promise<void>((resolve) => this.server.close(() => resolve()));
  }
}

/** The one-time link in a letter. */
export function linkIn(text: string): string {
  const link = /https?:\/\/\S+#[\w-]+/.exec(text)?.[0];
  if (link === undefined) throw new Error(`There is no link in: ${text}`);
  return link;
}

/** What its link proves. */
export function tokenIn(text: string): string {
  return linkIn(text).split('#')[1] ?? '';
}
