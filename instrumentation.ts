/** At start: streams end when the server is asked to, so that it can drain and leave. */
export async function register(): Promise<void> {
  if (process.env['NEXT_RUNTIME'] !== 'nodejs') return;
  const { endAllStreams } = await import('@/db/listener');
  process.once('SIGTERM', endAllStreams);
  process.once('SIGINT', endAllStreams);
}
