import type { ReactNode } from 'react';
import { Wordmark } from '@/components/ui/wordmark';

export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <header className="rail flex h-14 items-center bg-rail px-5">
        <Wordmark />
      </header>
      <main className="mx-auto max-w-lg px-4 py-10">{children}</main>
    </>
  );
}
