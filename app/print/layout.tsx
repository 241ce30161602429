import type { ReactNode } from 'react';

/** Paper is white, on the night shift too. */
export default function PrintLayout({ children }: { children: ReactNode }) {
  return (
    <div data-shift="day" className="min-h-screen bg-white text-ink">
      {children}
    </div>
  );
}
