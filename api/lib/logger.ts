import { pino, type DestinationStream, type Logger } from 'pino';

export type { Logger };

const SECRET_FIELDS = [
  'password',
  'newPassword',
  'currentPassword',
  'token',
  'signInCode',
  'joinCode',
  'secret',
  'cookie',
  'authorization',
];

/** JSON lines on standard output; anything that is named like a secret is left out wherever it stands. */
export function createLogger(level: string, destination?: DestinationStream): Logger {
  const options = {
    level,
    base: { app: 'slipstone' },
    timestamp: pino.stdTimeFunctions.isoTime,
    serializers: { err: toLoggedError },
    redact: {
      paths: SECRET_FIELDS.flatMap((field) => [field, `*.${field}`, `*.*.${field}`, `*.*["set-cookie"]`]),
      censor: '[left out]',
    },
  };
  return destination ? pino(options, destination) : pino(options);
}

/** A failed query carries what it was asked with, and the database's detail quotes rows: people's words, hashes, addresses. */
function toLoggedError(error: Error): object {
  const {
    parameters: _parameters,
    driverError: _driverError,
    detail: _detail,
    ...rest
  } = pino.stdSerializers.err(error);
  return rest;
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i;

/** The path alone, with link tokens masked: a log must not let its reader use somebody's link. Only files have dots. */
export function toLoggedPath(url: string): string {
  const path = url.split('?', 1)[0] ?? '';
  const isCall = path.startsWith('/api/');
  return path
    .split('/')
    .map((part) => (part.length >= 20 && !UUID.test(part) && (isCall || !part.includes('.')) ? '[token]' : part))
    .join('/');
}
