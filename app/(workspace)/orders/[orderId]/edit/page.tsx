import { notFound } from 'next/navigation';
import { BesideDraft } from '@/app/(workspace)/orders/_components/beside-draft';
import { DraftForm } from '@/app/(workspace)/orders/_components/draft-form';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { loadPartsToSend } from '@/db/read-models/builds';
import { loadPartners } from '@/db/read-models/partners';
import { can } from '@/lib/domain/actor';

export const metadata = { title: 'Draft' };

export default async function EditDraftPage(props: OrderPageProps) {
  const { view, actor, more } = await openOrder(props, async (tx, asker, orderId) => ({
    partners: await loadPartners(tx, asker),
    ...(await loadPartsToSend(tx, asker, orderId)),
  }));
  const { facts } = view;
  if (facts.status !== 'draft' || !can(actor, 'order')) notFound();
  return (
    <main className="page">
      <h1 className="mb-4">
        Draft {facts.number}{' '}
        <a className="note font-normal" href={`/orders/${facts.id}`}>
          to its sizes
        </a>
      </h1>
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_372px]">
        <DraftForm
          orderId={facts.id}
          version={facts.version}
          values={{
            partnerShopId: facts.partner?.shopId ?? null,
            partIds: more.chosen,
            operations: facts.lines.map((line) => line.operation),
            neededBackOn: facts.neededBackOn,
            transport: view.transport,
            acceptRule: facts.acceptRule,
            notes: view.notes,
            standingInstruction: view.standingInstruction,
            reference: view.reference,
          }}
          partners={more.partners.filter(({ state }) => state === 'active' || state === 'invited')}
          parts={more.parts}
        />
        <BesideDraft actor={actor} opensParts={false} opensShops={false} />
      </div>
    </main>
  );
}
