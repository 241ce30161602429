import { randomUUID } from 'node:crypto';
import { z } from 'zod';
import { createDraftAction } from '@/app/(workspace)/orders/new/actions';
import { ChoiceField, SelectField, TextArea, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Empty } from '@/components/ui/empty';
import { Sheet } from '@/components/ui/sheet';
import { begin } from '@/db/client';
import { loadParts } from '@/db/read-models/builds';
import { loadOrder } from '@/db/read-models/order-page';
import { loadPartners } from '@/db/read-models/partners';
import { requirePageTicket } from '@/lib/auth/ticket';
import { OPERATIONS } from '@/lib/domain/operations/catalogue';
import { needsSizes } from '@/lib/domain/operations/operation';

export const metadata = { title: 'New work order' };

const TRANSPORT = [
  { value: 'delivered', label: 'We bring them' },
  { value: 'fetched', label: 'They fetch them' },
];
const ACCEPT = [
  { value: 'own_check', label: 'After our own check', note: 'the parts come home first' },
  { value: 'readings', label: 'On their readings' },
];

export default async function NewOrderPage({ searchParams }: { searchParams: Promise<{ like?: string }> }) {
  const likeId = z.uuid().safeParse((await searchParams).like);
  const { partners, parts, like } = await begin(await requirePageTicket(), async (tx, actor) => ({
    // An earlier order to begin from: what was asked of whom; its parts, sizes and price stay with it.
    like: likeId.success ? await loadOrder(tx, actor, likeId.data) : undefined,
    partners: await loadPartners(tx, actor),
    parts: (await loadParts(tx, actor, { limit: 300, after: null })).rows,
  }));
  const atHome = parts.filter((part) => part.where.some(({ place }) => place === 'home'));
  const shops = partners.filter(({ state }) => state === 'active' || state === 'invited');
  return (
    <main className="page">
      <h1 className="mb-4">New work order</h1>
      {atHome.length === 0 || shops.length === 0 ? (
        <Empty title="First things first">
          {atHome.length === 0 && (
            <p>
              Write the part down on its <a href="/builds">build</a>.
            </p>
          )}
          {shops.length === 0 && (
            <p>
              Name the machine shop under <a href="/shops">Shops</a>. You can send it the order before it has
              come in.
            </p>
          )}
        </Empty>
      ) : (
        <Form
          action={createDraftAction}
          requestKey={randomUUID()}
          className="grid max-w-4xl gap-5"
          label="New work order"
        >
          <Sheet title="What goes where">
            <div className="grid gap-4">
              <SelectField
                name="partnerShopId"
                label="To"
                defaultValue={like?.facts.partner?.shopId ?? ''}
                options={[
                  { value: '', label: 'Choose the machine shop' },
                  ...shops.map(({ shopId, name, isHere }) => ({
                    value: shopId,
                    label: isHere ? name : `${name} (invited)`,
                  })),
                ]}
              />
              <ChoiceField
                kind="checkbox"
                name="partIds"
                label="Parts"
                options={atHome.map((part) => ({
                  value: part.id,
                  label: `${part.pieces} ${part.kind}${part.stamps.length > 0 ? `, stamp ${part.stamps.join(' ')}` : ''}`,
                  note:
                    part.buildNumber === null ? 'no build' : `B-${part.buildNumber} · ${part.engine ?? ''}`,
                }))}
              />
              <ChoiceField
                kind="checkbox"
                name="operations"
                label="What is to be done"
                defaultValue={like?.facts.lines.map((line) => line.operation).join('\n') ?? ''}
                options={OPERATIONS.map((operation) => ({
                  value: operation.key,
                  label: operation.title,
                  note: needsSizes(operation) ? 'needs sizes' : 'needs no sizes',
                }))}
              />
            </div>
          </Sheet>
          <Sheet title="When and how">
            <div className="grid gap-4 sm:grid-cols-2">
              <TextField name="neededBackOn" label="Needed back" type="date" />
              <TextField name="reference" label="Our reference" />
              <ChoiceField
                kind="radio"
                name="transport"
                label="How the parts travel"
                options={TRANSPORT}
                defaultValue="delivered"
                className="sm:col-span-2"
              />
              <ChoiceField
                kind="radio"
                name="acceptRule"
                label="The work is accepted"
                options={ACCEPT}
                defaultValue="own_check"
                className="sm:col-span-2"
              />
              <TextArea
                name="notes"
                label="Notes for the machine shop"
                defaultValue={like?.notes ?? ''}
                className="sm:col-span-2"
              />
              <TextArea
                name="standingInstruction"
                label="Standing instruction"
                defaultValue={like?.standingInstruction ?? ''}
                hint="An answer given ahead: if it will not clean up go to .020, spend up to so much without asking, or stop and ring."
                className="sm:col-span-2"
              />
            </div>
          </Sheet>
          <div>
            <Submit>Keep as a draft</Submit>
            <p className="note mt-2">Nobody else sees a draft. Its sizes and sending come next.</p>
          </div>
        </Form>
      )}
    </main>
  );
}
