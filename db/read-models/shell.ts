import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

/** What the frame around every page shows. */
export interface ShellView {
  readonly actor: Actor;
  readonly shops: readonly { readonly id: string; readonly name: string }[];
  readonly colleagues: readonly { readonly id: string; readonly name: string }[];
}

/** The person's shops and the colleagues who may take over this screen: one statement. */
export async function loadShell(tx: Tx, actor: Actor): Promise<ShellView> {
  const { rows } = await tx.raw<{ rows: Pick<ShellView, 'shops' | 'colleagues'>[] }>(
    `select coalesce((select json_agg(json_build_object('id', shop_id, 'name', name)) from shops_of_asker()), '[]') as shops,
       coalesce((select json_agg(json_build_object('id', p.id, 'name', p.name) order by p.name) from memberships m join people p on p.id = m.person_id
         where m.shop_id = ? and m.ended_at is null and p.id <> ?), '[]') as colleagues`,
    [actor.shopId, actor.personId],
  );
  return { actor, ...(rows[0] ?? { shops: [], colleagues: [] }) };
}
