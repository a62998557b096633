/** The parts of a mail message that the demo's mailbox shows. */
export interface ReadLetter {
  readonly subject: string;
  readonly to: string;
  readonly headers: Readonly<Record<string, string>>;
  readonly text: string;
  readonly html: string;
}

interface Part {
  readonly headers: Readonly<Record<string, string>>;
  readonly body: string;
}

/** Reads a raw message (latin-1 string of its bytes) as nodemailer writes it: headers, alternatives, transfer encodings. */
export function readLetter(raw: string): ReadLetter {
  const message = splitPart(raw);
  const leaves = listLeaves(message);
  const find = (type: string) => leaves.find((leaf) => contentType(leaf).startsWith(type));
  const decoded = (leaf: Part | undefined) => (leaf ? decodeBody(leaf) : '');
  return {
    subject: decodeWords(message.headers['subject'] ?? ''),
    to: decodeWords(message.headers['to'] ?? ''),
    headers: message.headers,
    text: decoded(find('text/plain')),
    html: decoded(find('text/html')),
  };
}

function splitPart(raw: string): Part {
  const end = /\r?\n\r?\n/.exec(raw);
  const head = end ? raw.slice(0, end.index) : raw;
  const headers: Record<string, string> = {};
  for (const line of head.replace(/\r?\n[ \t]+/g, ' ').split(/\r?\n/)) {
    const at = line.indexOf(':');
    if (at > 0) headers[line.slice(0, at).toLowerCase()] = line.slice(at + 1).trim();
  }
  return { headers, body: end ? raw.slice(end.index + end[0].length) : '' };
}

function listLeaves(part: Part): Part[] {
  const boundary = /boundary="?([^";]+)"?/i.exec(part.headers['content-type'] ?? '')?.[1];
  if (!boundary) return [part];
  const pieces = part.body.split(new RegExp(`\\r?\\n?--${boundary.replace(/[^\w]/g, '\\$&')}`));
  return pieces.slice(1, -1).flatMap((piece) => listLeaves(splitPart(piece.replace(/^\r?\n/, ''))));
}

function contentType(part: Part): string {
  return (part.headers['content-type'] ?? 'text/plain').toLowerCase();
}

function decodeBody({ headers, body }: Part): string {
  const encoding = (headers['content-transfer-encoding'] ?? '').toLowerCase();
  if (encoding === 'base64') return Buffer.from(body, 'base64').toString('utf8');
  const bytes = encoding === 'quoted-printable' ? decodeQuotedPrintable(body.replace(/=\r?\n/g, '')) : body;
  return Buffer.from(bytes, 'latin1').toString('utf8').replaceAll('\r\n', '\n');
}

function decodeQuotedPrintable(text: string): string {
  return text.replace(/=([0-9A-F]{2})/gi, (_all, hex: string) => String.fromCharCode(Number.parseInt(hex, 16)));
}

/** RFC 2047: words such as =?UTF-8?Q?caf=C3=A9?=. */
function decodeWords(header: string): string {
  return header
    .replace(/(\?=)\s+(=\?)/g, '$1$2')
    .replace(/=\?utf-8\?([QB])\?([^?]*)\?=/gi, (_all, kind: string, text: string) => {
      const bytes =
        kind.toUpperCase() === 'B'
          ? Buffer.from(text, 'base64')
          : Buffer.from(decodeQuotedPrintable(text.replaceAll('_', ' ')), 'latin1');
      return bytes.toString('utf8');
    });
}
