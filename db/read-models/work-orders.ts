import 'server-only';
import type { Tx } from '@/db/client';
import { type OrderStub, STUB_COLUMNS } from '@/db/read-models/bench';
import type { Actor } from '@/lib/domain/actor';

/** What the list is narrowed to, and where the page begins. */
export interface WorkOrderFilter {
  readonly show: 'open' | 'all' | 'drafts' | 'ended';
  readonly find: string;
  /** The last order of the page before: numbers run per sender, so its id comes along. */
  readonly before: { readonly number: number; readonly orderId: string } | null;
}

export interface WorkOrderPage {
  readonly rows: readonly OrderStub[];
  /** Where to go on from; null on the last page. */
  readonly next: WorkOrderFilter['before'];
}

const PAGE = 50;

/** One page of work orders, newest number first, by keyset; one statement. Words are found by their beginnings. */
export async function loadWorkOrders(tx: Tx, actor: Actor, filter: WorkOrderFilter): Promise<WorkOrderPage> {
  const words = filter.find
    .toLowerCase()
    .split(/[^\p{L}\p{N}]+/u)
    .filter((word) => word !== '')
    .slice(0, 5);
  const conditions = ['s.shop_id = ?'];
  const values: (string | number)[] = [actor.shopId];
  if (filter.show === 'open') conditions.push("s.open and s.status <> 'draft'");
  if (filter.show === 'drafts') conditions.push("s.status = 'draft'");
  if (filter.show === 'ended') conditions.push('not s.open');
  for (const word of words) {
    // Beginnings as a range: pattern operators lose their index under row-level security.
    conditions.push(
      'exists (select 1 from order_words w where w.shop_id = ? and w.word >= ? and w.word < ? and w.order_id = s.order_id)',
    );
    values.push(actor.shopId, word, `${word}\u{10ffff}`);
  }
  if (filter.before !== null) {
    conditions.push('(s.number, s.order_id) < (?, ?::uuid)');
    values.push(filter.before.number, filter.before.orderId);
  }
  const { rows } = await tx.raw<{ rows: OrderStub[] }>(
    `select ${STUB_COLUMNS} from order_sides s where ${conditions.join(' and ')} order by s.number desc, s.order_id desc limit ${PAGE + 1}`,
    values,
  );
  const page = rows.slice(0, PAGE);
  const last = page.at(-1);
  const next = last && rows.length > PAGE ? { number: last.number, orderId: last.orderId } : null;
  return { rows: page, next };
}
