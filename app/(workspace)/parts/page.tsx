import { randomUUID } from 'node:crypto';
import { z } from 'zod';
import { addPartAction } from '@/app/(workspace)/builds/actions';
import { AddPart } from '@/components/builds/add-part';
import { Scroll } from '@/components/ui/scroll';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadParts } from '@/db/read-models/builds';
import { requirePageTicket } from '@/lib/auth/ticket';
import { can } from '@/lib/domain/actor';
import { sayWhereabouts } from '@/lib/forms/part-words';

export const metadata = { title: 'Parts' };

export default async function PartsPage({ searchParams }: { searchParams: Promise<{ after?: unknown }> }) {
  const after = z.uuid().safeParse((await searchParams).after).data ?? null;
  const { parts, actor } = await begin(await requirePageTicket(), async (tx, asker) => ({
    parts: await loadParts(tx, asker, { limit: 100, after }),
    actor: asker,
  }));
  return (
    <main className="page">
      <h1 className="mb-4">Parts</h1>
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_372px]">
        <Sheet title="Everything of ours, and who has it">
          {parts.rows.length === 0 && <p className="note">No parts are written down yet.</p>}
          <Scroll label="Parts">
            <table className="w-full text-[15px]">
              <thead>
                <tr className="border-b border-rule text-left text-[13px] text-ink-3">
                  <th className="py-2 pr-3 font-medium">Part</th>
                  <th className="py-2 pr-3 font-medium">Stamp</th>
                  <th className="py-2 pr-3 font-medium">Build</th>
                  <th className="py-2 font-medium">Who has it</th>
                </tr>
              </thead>
              <tbody>
                {parts.rows.map((part) => (
                  <tr key={part.id} className="border-b border-rule-2">
                    <th scope="row" className="py-2 pr-3 text-left font-normal">
                      {part.pieces} {part.kind}
                    </th>
                    <td className="num pr-3">{part.stamps.join(' ')}</td>
                    <td className="pr-3">
                      {part.buildId !== null && (
                        <a href={`/builds/${part.buildId}`}>
                          B-{part.buildNumber} {part.engine}
                        </a>
                      )}
                    </td>
                    <td>{sayWhereabouts(part)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </Scroll>
          {parts.next !== null && (
            <a href={`/parts?after=${parts.next}`} className="btn btn-ghost mt-3">
              Older parts
            </a>
          )}
        </Sheet>
        {can(actor, 'builds') && (
          <Sheet title="A part with no build" note="Stock, or a loose part that belongs to no engine here.">
            <AddPart action={addPartAction} requestKey={randomUUID()} buildId="" />
          </Sheet>
        )}
      </div>
    </main>
  );
}
