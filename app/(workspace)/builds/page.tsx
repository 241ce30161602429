import { z } from 'zod';
import { Scroll } from '@/components/ui/scroll';
import { Empty } from '@/components/ui/empty';
import { begin } from '@/db/client';
import { loadBuilds } from '@/db/read-models/builds';
import { now } from '@/lib/adapters/clock';
import { requirePageTicket } from '@/lib/auth/ticket';
import { sayDay } from '@/lib/forms/say';

export const metadata = { title: 'Builds' };

export default async function BuildsPage({ searchParams }: { searchParams: Promise<{ below?: unknown }> }) {
  const below =
    z.coerce
      .number()
      .int()
      .positive()
      .safeParse((await searchParams).below).data ?? null;
  const builds = await begin(await requirePageTicket(), (tx, actor) =>
    loadBuilds(tx, actor, { limit: 100, below }),
  );
  const year = now().getUTCFullYear();
  return (
    <main className="page">
      <div className="mb-4 flex items-baseline">
        <h1>Builds</h1>
        <a href="/builds/new" className="btn ml-auto">
          New build
        </a>
      </div>
      {builds.rows.length === 0 ? (
        <Empty title="No builds yet">
          A build is one engine: how it is made, its parts, and the work they need.
        </Empty>
      ) : (
        <div className="sheet">
          <Scroll label="Builds">
            <table className="w-full text-[15px]">
              <thead>
                <tr className="border-b border-rule text-left text-[13px] text-ink-3">
                  <th className="px-4 py-2 font-medium">Build</th>
                  <th className="px-4 py-2 font-medium">Engine</th>
                  <th className="px-4 py-2 font-medium">Customer</th>
                  <th className="px-4 py-2 font-medium">Parts</th>
                  <th className="px-4 py-2 font-medium">Open orders</th>
                  <th className="px-4 py-2 font-medium">Needed</th>
                </tr>
              </thead>
              <tbody>
                {builds.rows.map((build) => (
                  <tr key={build.id} className="border-b border-rule-2">
                    <th scope="row" className="px-4 py-2.5 text-left">
                      <a href={`/builds/${build.id}`}>B-{build.number}</a>
                    </th>
                    <td className="px-4">{build.engine}</td>
                    <td className="px-4">{build.customerName}</td>
                    <td className="num px-4">{build.parts}</td>
                    <td className="num px-4">{build.openOrders}</td>
                    <td className="px-4">{build.neededOn === null ? '' : sayDay(build.neededOn, year)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </Scroll>
        </div>
      )}
      {builds.next !== null && (
        <a href={`/builds?below=${builds.next}`} className="btn btn-ghost mt-3">
          Older builds
        </a>
      )}
    </main>
  );
}
