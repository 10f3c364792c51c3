import pino from 'pino';
import { config } from './index';
import { loggedError } from './loggedError';

let instance: pino.Logger | undefined;

/** The process's structured log, on standard output. No personal data goes in. */
export function log(): pino.Logger {
  instance ??= pino({
    level: config().logLevel,
    base: undefined,
    timestamp: pino.stdTimeFunctions.isoTime,
    serializers: { err: loggedError },
  });
  return instance;
}
