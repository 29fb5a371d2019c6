import pino, { type Logger } from 'pino';
import { settings } from './settings';

let logger: Logger | undefined;

/** One JSON line an event on standard error; never a password, a token or an e-mail address. */
export function log(): Logger {
  logger ??= pino(
    {
      level: settings().logLevel,
      base: undefined,
      redact: ['password', '*.password', 'token', '*.token', 'email', '*.email'],
    },
    pino.destination(2),
  );
  return logger;
}
