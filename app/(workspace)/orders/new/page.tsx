import { randomUUID } from 'node:crypto';
import { redirect } from 'next/navigation';
import { z } from 'zod';
import { BesideDraft } from '@/app/(workspace)/orders/_components/beside-draft';
import { DraftForm } from '@/app/(workspace)/orders/_components/draft-form';
import { Empty } from '@/components/ui/empty';
import { begin } from '@/db/client';
import { loadPartsToSend } from '@/db/read-models/builds';
import { isThere, loadOrder, type OrderView } from '@/db/read-models/order-page';
import { loadPartners } from '@/db/read-models/partners';
import { requirePageTicket } from '@/lib/auth/ticket';
import type { DraftInput } from '@/lib/schemas/order-draft';

export const metadata = { title: 'New work order' };

export default async function NewOrderPage({
  searchParams,
}: {
  searchParams: Promise<{ like?: string; draft?: string }>;
}) {
  const asked = await searchParams;
  const likeId = z.uuid().safeParse(asked.like);
  const draftId = z.uuid().safeParse(asked.draft);
  // The draft's id stands in the address, so that loading the page again goes on where one was.
  if (!draftId.success)
    redirect(`/orders/new?draft=${randomUUID()}${likeId.success ? `&like=${likeId.data}` : ''}`);
  const { actor, partners, parts, like, isKept } = await begin(
    await requirePageTicket(),
    async (tx, asker) => ({
      actor: asker,
      // An earlier order to begin from: what was asked of whom; its parts, sizes and price stay with it.
      like: likeId.success ? await loadOrder(tx, asker, likeId.data) : undefined,
      isKept: await isThere(tx, draftId.data),
      partners: await loadPartners(tx, asker),
      parts: (await loadPartsToSend(tx, asker, null)).parts,
    }),
  );
  if (isKept) redirect(`/orders/${draftId.data}/edit`);
  const shops = partners.filter(({ state }) => state === 'active' || state === 'invited');
  return (
    <main className="page">
      <h1 className="mb-4">New work order</h1>
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_372px]">
        {parts.length === 0 || shops.length === 0 ? (
          <Empty title="First things first">
            {parts.length === 0 && <p>Write the part down, here or on its build.</p>}
            {shops.length === 0 && (
              <p>Name the machine shop. You can send it the order before it has come in.</p>
            )}
          </Empty>
        ) : (
          <DraftForm
            orderId={draftId.data}
            version={0}
            values={valuesLike(like)}
            partners={shops}
            parts={parts}
          />
        )}
        <BesideDraft actor={actor} opensParts={parts.length === 0} opensShops={shops.length === 0} />
      </div>
    </main>
  );
}

function valuesLike(like: OrderView | undefined): DraftInput {
  return {
    partnerShopId: like?.facts.partner?.shopId ?? null,
    partIds: [],
    operations: like?.facts.lines.map((line) => line.operation) ?? [],
    neededBackOn: null,
    transport: like?.transport ?? 'delivered',
    acceptRule: like?.facts.acceptRule ?? 'own_check',
    notes: like?.notes ?? '',
    standingInstruction: like?.standingInstruction ?? '',
    reference: '',
  };
}
