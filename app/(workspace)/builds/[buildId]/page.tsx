import { randomUUID } from 'node:crypto';
import { notFound } from 'next/navigation';
import { z } from 'zod';
import { addPartAction, changeBuildAction } from '@/app/(workspace)/builds/actions';
import { AddPart } from '@/components/builds/add-part';
import { BuildFields } from '@/components/builds/build-fields';
import { Form, Submit } from '@/components/forms/form';
import { CrankMap } from '@/components/parts-map/crank-map';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadBuild } from '@/db/read-models/builds';
import { requirePageTicket } from '@/lib/auth/ticket';
import { describeMade, PRESETS } from '@/lib/domain/builds/presets';
import { sayWhereabouts } from '@/lib/forms/part-words';

export const metadata = { title: 'Build' };

export default async function BuildPage({ params }: { params: Promise<{ buildId: string }> }) {
  const buildId = z.uuid().safeParse((await params).buildId);
  const ticket = await requirePageTicket();
  const build = buildId.success
    ? await begin(ticket, (tx, actor) => loadBuild(tx, actor, buildId.data))
    : undefined;
  if (!build) notFound();
  const preset =
    PRESETS.find((one) => JSON.stringify(one.made) === JSON.stringify(build.made))?.key ?? 'inline6';
  return (
    <main className="page">
      <h1>
        B-{build.number} · {build.engine}
      </h1>
      <p className="note mb-4">{describeMade(build.made)}</p>
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_372px]">
        <div className="grid gap-5">
          <Sheet title="How it is made">
            <CrankMap made={build.made} />
          </Sheet>
          <Sheet title="Parts">
            {build.parts.length === 0 && (
              <p className="note mb-3">Write the crankshaft, block or rods down here, with their stamps.</p>
            )}
            <ul>
              {build.parts.map((part) => (
                <li
                  key={part.id}
                  className="flex flex-wrap items-baseline gap-x-4 border-b border-rule-2 py-2"
                >
                  <b className="font-semibold">
                    {part.pieces} {part.kind}
                  </b>
                  {part.stamps.length > 0 && <span className="num">stamp {part.stamps.join(' ')}</span>}
                  {part.makerNo !== '' && <span className="note">no. {part.makerNo}</span>}
                  {part.condition !== '' && <span className="note">{part.condition}</span>}
                  <span className="note ml-auto">{sayWhereabouts(part)}</span>
                </li>
              ))}
            </ul>
            <AddPart
              action={addPartAction}
              requestKey={randomUUID()}
              buildId={build.id}
              className="mt-4 sm:grid-cols-2"
            />
          </Sheet>
          <Sheet title="Work orders">
            {build.orders.length === 0 && <p className="note">None yet.</p>}
            <ul>
              {build.orders.map((order) => (
                <li key={order.orderId} className="flex flex-wrap gap-x-4 border-b border-rule-2 py-2">
                  <a href={`/orders/${order.orderId}`}>WO {order.number}</a> {order.title}
                  <span className="note ml-auto">{order.step ?? order.theirStep ?? order.status}</span>
                </li>
              ))}
            </ul>
          </Sheet>
        </div>
        <Sheet title="The build">
          <Form
            action={changeBuildAction}
            version={build.version}
            hidden={{ buildId: build.id }}
            className="grid gap-4"
            label="The build"
          >
            <BuildFields
              engine={build.engine}
              preset={preset}
              customerName={build.customerName ?? ''}
              notes={build.notes}
              neededOn={build.neededOn ?? ''}
            />
            <Submit kind="ghost">Keep the changes</Submit>
          </Form>
        </Sheet>
      </div>
    </main>
  );
}
