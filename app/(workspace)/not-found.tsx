export default function NothingHere() {
  return (
    <main className="mx-auto max-w-lg px-4 py-12">
      <h1 className="mb-3">There is nothing on this hook</h1>
      <p>
        The page does not exist, or it is not for your shop or your role.{' '}
        <a href="/bench">Back to the bench</a>
      </p>
    </main>
  );
}
