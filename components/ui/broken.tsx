'use client';

export interface BrokenProps {
  error: Error & { digest?: string };
  reset: () => void;
}

/** What is said when something broke: nothing was changed, the number to name, and one press to try again. */
export function Broken({ error, reset }: BrokenProps) {
  return (
    <main className="mx-auto max-w-lg px-4 py-12">
      <h1 className="mb-3">Something broke on our side</h1>
      <p className="mb-4">
        Nothing was changed. Try again; if it stays, tell us this number:{' '}
        <span className="num">{error.digest ?? 'none'}</span>
      </p>
      <button type="button" className="btn" onClick={reset}>
        Try again
      </button>
    </main>
  );
}
