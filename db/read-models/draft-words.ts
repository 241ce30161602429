import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

/** What a draft's title and search words are made of. */
export interface DraftWords {
  /** The one build that all the parts belong to, if they do. */
  readonly buildId: string | null;
  readonly engine: string;
  readonly partnerName: string;
  readonly parts: readonly {
    readonly id: string;
    readonly kind: string;
    readonly stamps: readonly string[];
    readonly makerNo: string;
  }[];
}

/** Reads the names behind a draft's choices; parts that are not the shop's are left out. */
export async function loadDraftWords(
  tx: Tx,
  actor: Actor,
  chosen: {
    readonly partnerShopId: string | null;
    readonly partIds: readonly string[];
  },
): Promise<DraftWords> {
  const { rows } = await tx.raw<{ rows: DraftWords[] }>(
    `with chosen as (select p.id, p.kind, case when cardinality(p.stamps) > 0 then p.stamps else array[p.stamp] end as stamps, p.maker_no, p.build_id from parts p where p.id = any (?) and p.shop_id = ?),
       one_build as (select min(build_id::text)::uuid as id from chosen having count(distinct build_id) = 1 and count(*) = count(build_id))
     select (select id from one_build) as "buildId", coalesce((select engine from builds b join one_build o on o.id = b.id), '') as engine,
       coalesce((select name from shops where id = ?), '') as "partnerName",
       coalesce((select json_agg(json_build_object('id', id, 'kind', kind, 'stamps', stamps, 'makerNo', maker_no) order by kind, id) from chosen), '[]') as parts`,
    [[...chosen.partIds], actor.shopId, chosen.partnerShopId],
  );
  return rows[0] ?? { buildId: null, engine: '', partnerName: '', parts: [] };
}
