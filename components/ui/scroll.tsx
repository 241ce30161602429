import type { ReactNode } from 'react';

/** A table that may be wider than the screen: it scrolls by itself, by keyboard too. */
export function Scroll({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div className="overflow-x-auto" role="region" aria-label={label} tabIndex={0}>
      {children}
    </div>
  );
}
