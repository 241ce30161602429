import 'server-only';
import type { Tx } from '@/db/client';
import { WORKSHEET_COLUMNS, type WorksheetRow } from '@/db/repositories/worksheets';
import type { Length } from '@/lib/domain/quantity/length';
import type { PartnerFigures } from '@/lib/domain/sizes/partner-figures';

export interface RevLineView {
  readonly lineId: string;
  readonly title: string;
  readonly since: number;
  readonly source: string;
  readonly steps: readonly { readonly rule?: boolean; readonly label?: string; readonly text?: string }[];
  readonly checks: readonly { readonly tone: 'fine' | 'note' | 'warn' | 'refuse'; readonly words: string }[];
  readonly sizes: readonly {
    readonly feature: string;
    readonly what: string;
    readonly target: Length;
    readonly lower: Length;
    readonly upper: Length;
    /** The figures released in the partner's unit, rounded inward; null where both shops use one unit. */
    readonly partner: PartnerFigures | null;
  }[];
}

export interface RevView {
  readonly number: number;
  readonly unit: 'in' | 'mm';
  readonly reason: string;
  readonly author: string;
  readonly releasedAt: string;
  readonly lines: readonly RevLineView[];
}

export interface RepeatBackView {
  readonly what: string;
  readonly keyedLower: string;
  readonly keyedUpper: string;
  readonly matches: boolean;
  readonly author: string;
  readonly at: string;
  readonly since: number;
}

export interface SizesView {
  readonly revs: readonly RevView[];
  readonly repeated: readonly RepeatBackView[];
  readonly sheets: readonly WorksheetRow[];
}

/** Revs with their working, newest first, what was repeated back, and the sheets the asker may see: one statement. */
export async function loadSizes(tx: Tx, orderId: string): Promise<SizesView> {
  const { rows } = await tx.raw<{ rows: SizesView[] }>(
    `select coalesce((select json_agg(x order by x.number desc) from (
         select v.number, v.unit, v.reason, v.author_name as author, v.released_at as "releasedAt",
           (select json_agg(json_build_object('lineId', l.line_id, 'title', o.title, 'since', l.since, 'source', l.source, 'steps', l.steps, 'checks', l.checks,
              'sizes', (select json_agg(json_build_object('feature', z.feature, 'what', z.what, 'target', z.target_nm, 'lower', z.lower_nm, 'upper', z.upper_nm,
                'partner', case when z.partner_target_nm is null then null else
                  json_build_object('target', z.partner_target_nm, 'lower', z.partner_lower_nm, 'upper', z.partner_upper_nm) end) order by z.position)
                from rev_sizes z where z.order_id = l.order_id and z.rev = l.rev and z.line_id = l.line_id)) order by o.position)
            from rev_lines l join order_lines o on o.id = l.line_id where l.order_id = v.order_id and l.rev = v.number) as lines
         from revs v where v.order_id = ?) x), '[]') as revs,
       coalesce((select json_agg(y order by y.at desc) from (
         select what, keyed_lower_text as "keyedLower", keyed_upper_text as "keyedUpper", matches, author_name as author, at, since
         from repeat_backs where order_id = ?) y), '[]') as repeated,
       coalesce((select json_agg(z order by z.position) from (
         select ${WORKSHEET_COLUMNS}, l.position from worksheets w join order_lines l on l.id = w.line_id
         where w.order_id = ? and l.removed_at is null) z), '[]') as sheets`,
    [orderId, orderId, orderId],
  );
  return rows[0] ?? { revs: [], repeated: [], sheets: [] };
}
