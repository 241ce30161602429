import 'server-only';
import { randomBytes } from 'node:crypto';
import pino from 'pino';

const logger = pino({ base: null, redact: ['password', 'secret', 'token', '*.password', '*.secret'] });

/** Writes one line of what happened. */
export function logEvent(event: string, more: Readonly<Record<string, unknown>> = {}): void {
  logger.info({ event, ...more });
}

/** Writes an unexpected error down once and answers the id by which a person can name it. */
export function reportUnexpected(error: unknown): string {
  const id = randomBytes(4).toString('hex');
  logger.error({ event: 'unexpected', id, err: error });
  return id;
}
