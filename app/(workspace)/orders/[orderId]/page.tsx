import { redirect } from 'next/navigation';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { tabOf } from '@/lib/forms/order-words';

/** Opens the tab where the reader's step is. */
export default async function OrderPage(props: OrderPageProps) {
  const { view } = await openOrder(props, () => Promise.resolve(undefined));
  const step = view.side === 'sender' ? view.stand.senderStep : view.stand.partnerStep;
  redirect(`/orders/${view.facts.id}/${view.facts.status === 'draft' ? 'sizes' : tabOf(step)}`);
}
