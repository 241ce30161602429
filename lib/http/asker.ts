import 'server-only';
import { headers } from 'next/headers';

/** Where a request comes from, as far as a server on loopback can tell. */
export async function askerOf(): Promise<{ address: string; agent: string }> {
  const sent = await headers();
  return {
    address: sent.get('x-forwarded-for')?.split(',')[0]?.trim() ?? 'here',
    agent: sent.get('user-agent') ?? '',
  };
}
