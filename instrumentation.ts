/** At start: streams end when the server is asked to, so that it can drain and leave. */
export async function register(): Promise<void> {
  if (process.env['NEXT_RUNTIME'] !== 'nodejs') return;
  const { endStreamsOnLeave } = await import('@/db/listener');
  endStreamsOnLeave();
}
