import { notFound } from 'next/navigation';
import { z } from 'zod';
import { openOrder } from '@/app/(workspace)/orders/_components/load';
import { Worksheet } from '@/components/worksheet/worksheet';
import { loadSizes } from '@/db/read-models/order-sizes';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import { madeOf } from '@/lib/services/worksheets';

export const metadata = { title: 'Work out the sizes' };

export default async function SheetPage({
  params,
}: {
  params: Promise<{ orderId: string; sheetId: string }>;
}) {
  const { view, more: sizes } = await openOrder({ params }, (tx, _actor, orderId) => loadSizes(tx, orderId));
  const sheetId = z.uuid().safeParse((await params).sheetId);
  const sheet = sizes.sheets.find((one) => one.id === sheetId.data);
  if (!sheet) notFound();
  return (
    <main className="page">
      <div className="mb-2 flex flex-wrap items-baseline gap-x-4">
        <span className="font-stencil text-[30px] font-extrabold tracking-wide">WO {view.facts.number}</span>
        <h1 className="text-[26px]">{operationByKey(sheet.operation).title}: work out the sizes</h1>
        <a href={`/orders/${view.facts.id}/sizes`} className="btn btn-ghost ml-auto">
          Back to the order
        </a>
      </div>
      <Worksheet
        id={sheet.id}
        version={sheet.version}
        operation={sheet.operation}
        made={madeOf(sheet)}
        unit={view.facts.sender.unit}
        raw={sheet.raw}
        house={view.house}
      />
    </main>
  );
}
