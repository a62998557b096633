import { createTransport } from 'nodemailer';

export interface Letter {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly headers: Readonly<Record<string, string>>;
}

export interface Mailer {
  /** Resolves when the mail server has taken the letter; throws when it has not. */
  send(letter: Letter): Promise<void>;
  close(): void;
}

/** Sends through one pooled connection to the mail server. */
export function createMailer(smtpUrl: string, from: string): Mailer {
  const transport = createTransport({
    url: smtpUrl,
    pool: true,
    maxConnections: 2,
    connectionTimeout: 15_000,
    greetingTimeout: 15_000,
    socketTimeout: 60_000,
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  return {
    async send({ to, subject, text, html, headers }) {
      await transport.sendMail({ from, to, subject, text, html, headers: { ...headers } });
    },
    close: () => transport.close(),
  };
}
