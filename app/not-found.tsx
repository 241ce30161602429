import { Wordmark } from '@/components/ui/wordmark';

export default function NotFound() {
  return (
    <>
      <header className="rail flex h-14 items-center bg-rail px-5">
        <a href="/bench" aria-label="Wiretag, to the bench">
          <Wordmark />
        </a>
      </header>
      <main className="mx-auto max-w-lg px-4 py-12">
        <h1 className="mb-3">There is nothing on this hook</h1>
        <p>
          The page does not exist, or it belongs to another shop. <a href="/bench">Back to the bench</a>
        </p>
      </main>
    </>
  );
}
