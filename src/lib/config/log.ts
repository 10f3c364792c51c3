import pino from 'pino';
import { config } from './index';

let instance: pino.Logger | undefined;

/** The process's structured log, on standard output. No personal data goes in. */
export function log(): pino.Logger {
  instance ??= pino({ level: config().logLevel, base: undefined, timestamp: pino.stdTimeFunctions.isoTime });
  return instance;
}
