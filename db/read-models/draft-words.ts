import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

/** What a draft's title and search words are made of. */
export interface DraftWords {
  readonly engine: string;
  readonly partnerName: string;
  readonly parts: readonly {
    readonly id: string;
    readonly kind: string;
    readonly stamp: string;
    readonly makerNo: string;
  }[];
}

/** Reads the names behind a draft's choices; parts that are not the shop's are left out. */
export async function loadDraftWords(
  tx: Tx,
  actor: Actor,
  chosen: {
    readonly buildId: string | null;
    readonly partnerShopId: string | null;
    readonly partIds: readonly string[];
  },
): Promise<DraftWords> {
  const { rows } = await tx.raw<{ rows: DraftWords[] }>(
    `select coalesce((select engine from builds where id = ? and shop_id = ?), '') as engine,
       coalesce((select name from shops where id = ?), '') as "partnerName",
       coalesce((select json_agg(json_build_object('id', id, 'kind', kind, 'stamp', stamp, 'makerNo', maker_no) order by kind, id)
         from parts where id = any (?) and shop_id = ?), '[]') as parts`,
    [chosen.buildId, actor.shopId, chosen.partnerShopId, [...chosen.partIds], actor.shopId],
  );
  return rows[0] ?? { engine: '', partnerName: '', parts: [] };
}
