import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';

/** A draft's header. */
export interface DraftHeader {
  readonly id: string;
  readonly partnerShopId: string | null;
  readonly buildId: string | null;
  readonly neededBackOn: string | null;
  readonly acceptRule: 'readings' | 'own_check';
  readonly transport: 'delivered' | 'fetched';
  readonly notes: string;
  readonly standingInstruction: string;
  readonly title: string;
  readonly words: readonly string[];
  readonly copiedFromId: string | null;
}

/** A line of a draft. */
export interface DraftLine {
  readonly id: string;
  readonly position: number;
  readonly operation: string;
  readonly catalogueVersion: number;
  readonly needsSizes: boolean;
  readonly title: string;
  readonly partIds: readonly string[];
  readonly worksheet: { readonly id: string; readonly raw: unknown } | null;
}

/** Opens a draft under the shop's next order number; answers the number. */
export async function insertDraft(tx: Tx, actor: Actor, draft: DraftHeader): Promise<number> {
  const { rows } = await tx.raw<{ rows: { number: number }[] }>(
    `insert into orders (id, sender_shop_id, partner_shop_id, number, build_id, currency, accept_rule, transport, needed_back_on, notes,
       standing_instruction, title, sender_step, copied_from_id)
     values (?, ?, ?, next_number('order'), ?, ?, ?, ?, ?, ?, ?, ?, 'Finish and send', ?) returning number`,
    [
      ...[
        draft.id,
        actor.shopId,
        draft.partnerShopId,
        draft.buildId,
        actor.currency,
        draft.acceptRule,
        draft.transport,
      ],
      ...[draft.neededBackOn, draft.notes, draft.standingInstruction, draft.title, draft.copiedFromId],
    ],
  );
  const number = rows[0]?.number ?? 0;
  await tx('orders')
    .where({ id: draft.id })
    .update({ words: [String(number), ...draft.words] });
  return number;
}

/** A draft as it stood before a change. */
export interface DraftBefore {
  readonly number: number;
  readonly version: number;
  readonly lines: readonly { readonly id: string; readonly operation: string }[];
}

/** Takes a draft's row for this transaction; undefined when it is no draft of the asker's shop. */
export async function takeDraft(tx: Tx, id: string): Promise<DraftBefore | undefined> {
  const order = await tx<{ id: string; status: string; number: number; version: number }>('orders')
    .where({ id, status: 'draft' })
    .forUpdate()
    .first('number', 'version');
  if (!order) return undefined;
  const lines = await tx<{ id: string; order_id: string; operation: string }>('order_lines')
    .where({ order_id: id })
    .select('id', 'operation');
  return { ...order, lines };
}

/** Writes a draft's header. */
export async function updateDraft(
  tx: Tx,
  draft: DraftHeader,
  { number, version }: Pick<DraftBefore, 'number' | 'version'>,
): Promise<void> {
  await tx('orders')
    .where({ id: draft.id, status: 'draft', version })
    .update({
      ...{
        partner_shop_id: draft.partnerShopId,
        build_id: draft.buildId,
        needed_back_on: draft.neededBackOn,
      },
      ...{
        accept_rule: draft.acceptRule,
        transport: draft.transport,
        notes: draft.notes,
        title: draft.title,
      },
      ...{
        standing_instruction: draft.standingInstruction,
        words: [String(number), ...draft.words],
        version: version + 1,
      },
    });
}

/** Takes the draft's lines off that are not kept, and its parts anew. */
export async function replaceParts(
  tx: Tx,
  orderId: string,
  partIds: readonly string[],
  keptLines: readonly string[],
): Promise<void> {
  await tx('order_line_parts').where({ order_id: orderId }).delete();
  await tx('worksheets')
    .where({ order_id: orderId })
    .whereNotIn('line_id', [...keptLines])
    .delete();
  await tx('order_lines')
    .where({ order_id: orderId })
    .whereNotIn('id', [...keptLines])
    .delete();
  await tx('order_parts').where({ order_id: orderId }).delete();
  await insertOrderParts(tx, orderId, partIds);
}

/** Puts the draft's lines into their order and adds the new ones; a line that is kept keeps its worksheet. */
export async function replaceLines(
  tx: Tx,
  actor: Actor,
  orderId: string,
  lines: readonly DraftLine[],
): Promise<void> {
  const kept = await tx<{ id: string; order_id: string }>('order_lines')
    .where({ order_id: orderId })
    .select('id');
  const isKept = (line: DraftLine) => kept.some(({ id }) => id === line.id);
  await tx('order_lines')
    .where({ order_id: orderId })
    .update({ position: tx.raw('position + 1000') });
  for (const { id, position } of lines.filter(isKept)) {
    await tx('order_lines').where({ id }).update({ position });
  }
  await insertLines(
    tx,
    actor,
    orderId,
    lines.filter((line) => !isKept(line)),
  );
  const links = lines
    .filter(isKept)
    .flatMap((line) =>
      line.partIds.map((partId) => ({ line_id: line.id, order_id: orderId, part_id: partId })),
    );
  if (links.length > 0) await tx('order_line_parts').insert(links);
}

/** Takes a snapshot of the parts, as the partner will see them: engine words and configuration come along. */
export async function insertOrderParts(tx: Tx, orderId: string, partIds: readonly string[]): Promise<void> {
  await tx.raw(
    `insert into order_parts (order_id, part_id, kind, stamp, stamps, maker_no, pieces, engine, made)
     select ?, p.id, p.kind, p.stamp, p.stamps, p.maker_no, p.pieces, coalesce(b.engine, ''), b.made
     from parts p left join builds b on b.id = p.build_id where p.id = any (?)`,
    [orderId, [...partIds]],
  );
}

/** Adds lines with their parts, and an empty worksheet for each line that needs sizes. */
export async function insertLines(
  tx: Tx,
  actor: Actor,
  orderId: string,
  lines: readonly DraftLine[],
): Promise<void> {
  if (lines.length === 0) return;
  await tx('order_lines').insert(
    lines.map((line) => ({
      ...{
        id: line.id,
        order_id: orderId,
        position: line.position,
        operation: line.operation,
        title: line.title,
      },
      ...{ catalogue_version: line.catalogueVersion, needs_sizes: line.needsSizes },
    })),
  );
  const links = lines.flatMap((line) =>
    line.partIds.map((partId) => ({ line_id: line.id, order_id: orderId, part_id: partId })),
  );
  if (links.length > 0) await tx('order_line_parts').insert(links);
  const sheets = lines.flatMap(({ id, operation, worksheet }) =>
    worksheet
      ? [
          {
            id: worksheet.id,
            shop_id: actor.shopId,
            order_id: orderId,
            line_id: id,
            operation,
            raw: JSON.stringify(worksheet.raw),
          },
        ]
      : [],
  );
  if (sheets.length > 0) await tx('worksheets').insert(sheets);
}

/** Keeps the asker's own reference for an order. */
export async function keepReference(tx: Tx, actor: Actor, orderId: string, text: string): Promise<void> {
  await tx.raw(
    `insert into order_references (shop_id, order_id, text) values (?, ?, ?)
     on conflict (shop_id, order_id) do update set text = excluded.text`,
    [actor.shopId, orderId, text],
  );
}

/** Throws a draft away with everything in it; false when it is not a draft of this shop. */
export async function deleteDraft(tx: Tx, orderId: string): Promise<boolean> {
  return (await tx('orders').where({ id: orderId, status: 'draft' }).delete()) === 1;
}
