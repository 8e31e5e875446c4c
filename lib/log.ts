import pino from 'pino';
import { config } from '@/lib/config';

/** The process's log: one JSON object a line on stdout; credentials and passwords never reach it. */
export const log = pino({
  level: config().logLevel,
  base: undefined,
  redact: {
    paths: ['password', 'token', 'authorization', 'cookie', '*.password', '*.token', '*.authorization', '*.cookie', 'headers.authorization', 'headers.cookie'],
    censor: '[hidden]',
  },
});
