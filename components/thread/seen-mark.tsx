'use client';

import { useEffect } from 'react';

/** Tells the server how far the messages have been in view; while the page is hidden nothing counts as read. */
export function SeenMark({ orderId, last, seen }: { orderId: string; last: number; seen: number }) {
  useEffect(() => {
    if (last <= seen) return;
    const tell = () => {
      if (document.visibilityState !== 'visible') return;
      document.removeEventListener('visibilitychange', tell);
      // Nothing hangs on it: what was not told now is told with the next message.
      void fetch(`/api/v1/orders/${orderId}/seen`, {
        method: 'PUT',
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify({ seq: last }),
        keepalive: true,
      }).catch(() => undefined);
    };
    document.addEventListener('visibilitychange', tell);
    tell();
    return () => document.removeEventListener('visibilitychange', tell);
  }, [orderId, last, seen]);
  return null;
}
