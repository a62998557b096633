import fs from 'node:fs';
import type { AddressInfo } from 'node:net';
import { readLetter } from './read-letter.ts';

export interface CaughtLetter {
  readonly id: number;
  readonly receivedAt: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

export interface MailCatcher {
  /** Where to send mail that is to be caught. */
  readonly url: string;
  /** Newest first. */
  list(): readonly CaughtLetter[];
  close(): Promise<void>;
}

const KEPT = 500;

/** A mail server on loopback that delivers nothing and keeps what it is given, in `file` too where one is named. */
export async function startMailCatcher(file: string | undefined): Promise<MailCatcher> {
  // Part of the development packages: a school's server has no use for it.
  const { SMTPServer } = await import('smtp-server');
  const letters = file ? readKept(file) : [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    logger: false,
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        const read = readLetter(Buffer.concat(chunks).toString('latin1'));
        const to = session.envelope.rcptTo.map(({ address }) => address).join(', ');
        const { subject, text, html } = read;
        const id = (letters.at(-1)?.id ?? 0) + 1;
        const letter = { id, receivedAt: new Date().toISOString(), to, subject, text, html };
        letters.push(letter);
        if (letters.length > KEPT) letters.shift();
        if (file) fs.appendFileSync(file, `${JSON.stringify(letter)}\n`, { mode: 0o600 });
        done();
      });
    },
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => resolve());
  });
  // A client that breaks off is not our concern, and an unheard error event would end the process.
  server.on('error', () => undefined);
  const { port } = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    list: () => letters.toReversed(),
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

function readKept(file: string): CaughtLetter[] {
  if (!fs.existsSync(file)) return [];
  const lines = fs.readFileSync(file, 'utf8').split('\n').filter(Boolean).slice(-KEPT);
  return lines.flatMap((line) => {
    try {
      return [JSON.parse(line) as CaughtLetter];
    } catch {
      // The last line of a server that was killed while writing.
      return [];
    }
  });
}
