import 'server-only';
import { createHmac } from 'node:crypto';
import { settings } from '@/lib/config/env';

/** What a link opens. */
export type LinkKind = 'invitation' | 'reset';

/**
 * The secret of a link, derived from its id: the database keeps only the hash, a task's payload only the id, and the
 * mail can still be written, and written again.
 */
export function linkSecret(kind: LinkKind, id: string): string {
  return createHmac('sha256', settings().NEXTAUTH_SECRET).update(`${kind}:${id}`).digest('base64url');
}

/** The address that a link in a mail opens. */
export function linkAddress(path: string): string {
  return new URL(path, settings().APP_URL).href;
}
