import { pino, type DestinationStream, type Logger } from 'pino';

/** What must never stand in a log, wherever a request, an answer or a body is logged. */
const secrets = [
  'req.headers.cookie',
  'req.headers.authorization',
  'res.headers["set-cookie"]',
  '*.password',
  '*.currentPassword',
  '*.newPassword',
  '*.passwordHash',
  'password',
];

export function createLog(level: string, destination?: DestinationStream): Logger {
  const options = { level, redact: { paths: secrets, censor: '[hidden]' } };
  return destination ? pino(options, destination) : pino(options);
}
