import 'server-only';
import type { Tx } from '@/db/client';
import type { Made } from '@/lib/domain/builds/made';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import type { Facts, LineFact } from '@/lib/domain/orders/facts';

interface LineJson extends Omit<LineFact, 'kit' | 'required'> {
  readonly made: Made | null;
}

interface FactsRow {
  facts: Omit<Facts, 'lines'> & { lines: LineJson[] };
}

/** Takes the order's row for this transaction; the first thing every command does. False when it is not visible. */
export async function lockOrder(tx: Tx, orderId: string): Promise<boolean> {
  const { rows } = await tx.raw<{ rows: unknown[] }>('select 1 from orders where id = ? for update', [
    orderId,
  ]);
  return rows.length === 1;
}

/** Everything a decision sees, in one statement; undefined outside the asker's orders. */
export async function findFacts(tx: Tx, orderId: string): Promise<Facts | undefined> {
  const { rows } = await tx.raw<{ rows: FactsRow[] }>(FACTS, [orderId]);
  const facts = rows[0]?.facts;
  return facts && { ...facts, lines: facts.lines.map(toLineFact) };
}

function toLineFact({ made, ...line }: LineJson): LineFact {
  const operation = operationByKey(line.operation);
  const features = made && line.needsSizes ? operation.features(made) : [];
  const places = line.operation === 'something_else' ? ['A'] : features;
  return {
    ...line,
    kit: operation.kit,
    required: line.needsSizes
      ? places.flatMap((feature) => operation.positions.map((position) => `${feature}|${position}`))
      : [],
  };
}

const SHOP = (alias: string) =>
  `json_build_object('shopId', ${alias}.id, 'name', ${alias}.name, 'unit', ${alias}.unit, 'timeZone', ${alias}.time_zone)`;
const LIST = (select: string) => `coalesce((select json_agg(x) from (${select}) x), '[]'::json)`;

const FACTS = `
select json_build_object(
  'id', o.id, 'number', o.number, 'version', o.version, 'logSeq', o.log_seq, 'status', o.status, 'round', o.round,
  'acceptRule', o.accept_rule, 'currency', o.currency,
  'sender', ${SHOP('s')}, 'partner', case when p.id is null then null else ${SHOP('p')} end,
  'partnership', (select w.state from partnerships w where w.a_shop_id = least(s.id, p.id) and w.b_shop_id = greatest(s.id, p.id)),
  'neededBackOn', o.needed_back_on, 'promisedOn', o.promised_on, 'firstPromisedOn', o.first_promised_on, 'promiseDays', o.promise_days,
  'latestRev', o.latest_rev, 'clock', o.clock,
  'punches', json_build_object('price', o.price_punch, 'parts', o.parts_punch, 'sizes', o.sizes_punch),
  'lines', ${LIST(`select l.id, l.operation, l.title, l.needs_sizes as "needsSizes", l.started_at is not null as started, l.stop_due as "stopDue",
      coalesce((select json_agg(lp.part_id) from order_line_parts lp where lp.line_id = l.id), '[]'::json) as "partIds",
      (select op.made from order_parts op where op.order_id = o.id and op.made is not null limit 1) as made
    from order_lines l where l.order_id = o.id and l.removed_at is null order by l.position`)},
  'parts', ${LIST(`select part_id as id, kind, pieces, stamps from order_parts where order_id = o.id order by kind, part_id`)},
  'moves', ${LIST(`select id, part_id as "partId", kind, pieces, stamps, kit, replaces_id as "replacesId"
    from custody_moves where order_id = o.id order by recorded_at, id`)},
  'restamps', ${LIST(`select part_id as "partId", from_stamp as "from", to_stamp as "to" from restamps where order_id = o.id order by at, id`)},
  'quotes', ${LIST(`select q.revision, q.kind, q.total_minor as "totalMinor", q.promised_on as "promisedOn", q.promise_days as "promiseDays",
      q.valid_until as "validUntil", coalesce((select a.answer from quote_answers a where a.order_id = q.order_id and a.revision = q.revision
        order by a.at desc, a.answer = 'agree' desc limit 1), 'open') as state
    from quotes q where q.order_id = o.id order by q.revision`)},
  'sizes', ${LIST(`select z.line_id as "lineId", l.since, z.feature, z.what, z.cutting, z.target_nm as target, z.lower_nm as lower, z.upper_nm as upper,
      case when z.partner_target_nm is null then null else
        json_build_object('target', z.partner_target_nm, 'lower', z.partner_lower_nm, 'upper', z.partner_upper_nm) end as partner
    from rev_sizes z join rev_lines l using (order_id, rev, line_id)
    where z.order_id = o.id and z.rev = o.latest_rev order by z.line_id, z.position`)},
  'repeated', ${LIST(`select line_id as "lineId", since, what, lower_nm as lower, upper_nm as upper from repeat_backs
    where order_id = o.id and matches`)},
  'holds', ${LIST(`select id, line_id as "lineId", reason, words, waits_for as "waitsFor", placed_by as "placedBy"
    from holds where order_id = o.id and lifted_at is null order by placed_at, id`)},
  'snags', ${LIST(`select id, line_id as "lineId", state, sizes_due as "sizesDue", price_minor as "priceMinor", days
    from snags where order_id = o.id and (state in ('raised', 'asked') or (state = 'approved' and sizes_due)) order by at, id`)},
  'read', ${LIST(`select distinct line_id as "lineId", round, feature || '|' || position as place from readings
    where order_id = o.id and purpose = 'cut'`)},
  'decisions', ${LIST(`select line_id as "lineId", round, decision from line_decisions where order_id = o.id`)}
) as facts
from orders o join shops s on s.id = o.sender_shop_id left join shops p on p.id = o.partner_shop_id
where o.id = ?`;
