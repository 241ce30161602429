import 'server-only';
import type { Tx } from '@/db/client';
import { type OrderStub, STUB_COLUMNS } from '@/db/read-models/bench';
import type { Actor } from '@/lib/domain/actor';

/** How the list is laid: newest number first, waited longest first, or needed soonest first. */
export type WorkOrderSort = 'number' | 'waiting' | 'needed';

/** The last order of the page before: what it was sorted by, and its id, since numbers run per sender. */
export interface WorkOrderPlace {
  readonly key: string;
  readonly orderId: string;
}

/** What the list is narrowed to, and where the page begins. */
export interface WorkOrderFilter {
  readonly show: 'open' | 'all' | 'drafts' | 'ended';
  readonly find: string;
  /** The other shop, or null for every one. */
  readonly with: string | null;
  readonly move: 'any' | 'mine' | 'theirs';
  readonly sort: WorkOrderSort;
  readonly after: WorkOrderPlace | null;
}

export interface WorkOrderPage {
  readonly rows: readonly OrderStub[];
  /** Where to go on from; null on the last page. */
  readonly next: WorkOrderPlace | null;
}

const PAGE = 50;

/** Each way to sort is an index of order_sides, read in its own order. */
const SORTS = {
  number: { key: 's.number', type: 'int', sign: '<', order: 's.number desc, s.order_id desc' },
  waiting: { key: 's.clock_since', type: 'timestamptz', sign: '>', order: 's.clock_since, s.order_id' },
  needed: {
    key: `coalesce(s.needed_back_on, 'infinity'::date)`,
    type: 'date',
    sign: '>',
    order: `coalesce(s.needed_back_on, 'infinity'::date), s.order_id`,
  },
} as const satisfies Record<WorkOrderSort, { key: string; type: string; sign: '<' | '>'; order: string }>;

const SHOWN = {
  open: "s.open and s.status <> 'draft'",
  drafts: "s.status = 'draft'",
  ended: 'not s.open',
  all: 'true',
} as const satisfies Record<WorkOrderFilter['show'], string>;

const MOVES = {
  any: 'true',
  mine: 's.step is not null',
  theirs: 's.step is null and s.their_step is not null',
} as const satisfies Record<WorkOrderFilter['move'], string>;

/** One page of work orders by keyset; one statement. Words are found by their beginnings. */
export async function loadWorkOrders(tx: Tx, actor: Actor, filter: WorkOrderFilter): Promise<WorkOrderPage> {
  const { key, type, sign, order } = SORTS[filter.sort];
  const conditions = ['s.shop_id = ?', SHOWN[filter.show], MOVES[filter.move]];
  const values: string[] = [actor.shopId];
  if (filter.with !== null) {
    conditions.push('s.other_shop_id = ?');
    values.push(filter.with);
  }
  for (const word of wordsOf(filter.find)) {
    // Beginnings as a range: pattern operators lose their index under row-level security.
    conditions.push(
      'exists (select 1 from order_words w where w.shop_id = ? and w.word >= ? and w.word < ? and w.order_id = s.order_id)',
    );
    values.push(actor.shopId, word, `${word}\u{10ffff}`);
  }
  if (filter.after !== null) {
    conditions.push(`(${key}, s.order_id) ${sign} (?::${type}, ?::uuid)`);
    values.push(filter.after.key, filter.after.orderId);
  }
  const { rows } = await tx.raw<{ rows: (OrderStub & { key: string })[] }>(
    `select ${STUB_COLUMNS}, ${key}::text as key from order_sides s where ${conditions.join(' and ')} order by ${order} limit ${PAGE + 1}`,
    values,
  );
  const page = rows.slice(0, PAGE);
  const last = page.at(-1);
  return {
    rows: page.map(({ key: _key, ...stub }) => stub),
    next: last && rows.length > PAGE ? { key: last.key, orderId: last.orderId } : null,
  };
}

function wordsOf(find: string): readonly string[] {
  return find
    .toLowerCase()
    .split(/[^\p{L}\p{N}]+/u)
    .filter((word) => word !== '')
    .slice(0, 5);
}
