import pino from 'pino';
import { env } from './config/env';

/** Fields that must never reach a log line. */
const SECRETS = ['password', 'secret', 'token', 'authorization', 'cookie', '*.password', '*.secret', '*.token', '*.authorization', '*.cookie'];

/** JSON lines on stdout; pino escapes control characters, so a name cannot forge a line. */
export const log = pino({ level: env().LOG_LEVEL, redact: SECRETS, base: undefined });

/** A logger whose lines say which part of the house speaks. */
export const logFor = (part: string) => log.child({ part });
