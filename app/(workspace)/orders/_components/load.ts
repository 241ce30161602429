import { notFound } from 'next/navigation';
import { z } from 'zod';
import { begin, type Tx } from '@/db/client';
import { loadOrder, type OrderView } from '@/db/read-models/order-page';
import { requirePageTicket } from '@/lib/auth/ticket';
import type { Actor } from '@/lib/domain/actor';

export interface OrderPageProps {
  readonly params: Promise<{ orderId: string }>;
}

/** Loads an order for one of its tabs, with what the tab needs besides. Not found outside the asker's orders. */
export async function openOrder<T>(
  props: OrderPageProps,
  more: (tx: Tx, actor: Actor, orderId: string) => Promise<T>,
): Promise<{ view: OrderView; actor: Actor; more: T }> {
  const orderId = z.uuid().safeParse((await props.params).orderId);
  const ticket = await requirePageTicket();
  if (!orderId.success) notFound();
  const page = await begin(ticket, async (tx, actor) => {
    const view = await loadOrder(tx, actor, orderId.data);
    return view && { view, actor, more: await more(tx, actor, orderId.data) };
  });
  if (!page) notFound();
  return page;
}
