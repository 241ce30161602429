'use client';

import { useRouter } from 'next/navigation';
import { useEffect } from 'react';

/** Shows the page again when something happens on the order (or on any, without one). The stream resumes by itself. */
export function LiveRefresh({ orderId }: { orderId?: string }) {
  const router = useRouter();
  useEffect(() => {
    const stream = new EventSource('/api/v1/feed');
    stream.addEventListener('happened', (happened) => {
      const { orderId: about } = JSON.parse(happened.data as string) as { orderId: string };
      if (orderId === undefined || about === orderId) router.refresh();
    });
    return () => stream.close();
  }, [orderId, router]);
  return null;
}
