import { beginUnknown } from '@/db/client';

export const dynamic = 'force-dynamic';

/** Says whether this process can do its work. */
export async function GET(): Promise<Response> {
  try {
    await beginUnknown((tx) => tx.raw('select 1'));
    return Response.json({ status: 'up' }, { headers: { 'cache-control': 'no-store' } });
  } catch {
    return Response.json(
      { status: 'down', database: 'away' },
      { status: 503, headers: { 'cache-control': 'no-store', 'retry-after': '5' } },
    );
  }
}
