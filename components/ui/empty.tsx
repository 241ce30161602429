import type { ReactNode } from 'react';

/** What an empty screen says: what belongs here, and what to do first. */
export function Empty({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div className="sheet px-6 py-8 text-center">
      <h2>{title}</h2>
      <div className="note mx-auto mt-2 max-w-xl">{children}</div>
    </div>
  );
}
