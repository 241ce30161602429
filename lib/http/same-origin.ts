import 'server-only';
import { settings } from '@/lib/config/env';
import { AppError } from '@/lib/errors';

/**
 * Refuses requests that another site sent: Sec-Fetch-Site where the browser says it, else Origin. A changing request
 * that says neither is refused too.
 */
export function requireSameOrigin(request: Request): void {
  if (request.method === 'GET' || request.method === 'HEAD') return;
  const site = request.headers.get('sec-fetch-site');
  if (site !== null) {
    if (site === 'same-origin') return;
  } else if (request.headers.get('origin') === new URL(settings().APP_URL).origin) {
    return;
  }
  throw new AppError('forbidden', 'This request did not come from Wiretag itself.');
}
