import { pino, type Logger } from 'pino';

/** JSON lines on standard output. */
export const createLogger = (level: string): Logger =>
  pino({ level, base: null, timestamp: pino.stdTimeFunctions.isoTime });
