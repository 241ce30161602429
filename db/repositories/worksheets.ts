import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { Made } from '@/lib/domain/builds/made';

/** A worksheet as it is kept: what was typed, sound or not. */
export interface WorksheetRow {
  readonly id: string;
  readonly orderId: string;
  readonly lineId: string;
  readonly operation: string;
  readonly raw: Readonly<Record<string, string>>;
  readonly shared: boolean;
  readonly version: number;
  readonly made: Made | null;
}

/** Columns of a worksheet `w`, also where it is read beside other things. */
export const WORKSHEET_COLUMNS = `w.id, w.order_id as "orderId", w.line_id as "lineId", w.operation, w.raw, w.shared, w.version,
  (select p.made from order_parts p where p.order_id = w.order_id and p.made is not null limit 1) as made`;

/** Worksheets of an order that the asker may see, in the order of its lines. */
export async function findWorksheets(tx: Tx, orderId: string): Promise<WorksheetRow[]> {
  const { rows } = await tx.raw<{ rows: WorksheetRow[] }>(
    `select ${WORKSHEET_COLUMNS} from worksheets w join order_lines l on l.id = w.line_id where w.order_id = ? and l.removed_at is null order by l.position`,
    [orderId],
  );
  return rows;
}

/** One worksheet. */
export async function findWorksheet(tx: Tx, id: string): Promise<WorksheetRow | undefined> {
  const { rows } = await tx.raw<{ rows: WorksheetRow[] }>(
    `select ${WORKSHEET_COLUMNS} from worksheets w where w.id = ?`,
    [id],
  );
  return rows[0];
}

/** Keeps what was typed if the sheet is still the version seen; answers the new version or undefined. */
export async function saveWorksheet(
  tx: Tx,
  id: string,
  version: number,
  raw: Readonly<Record<string, string>>,
): Promise<number | undefined> {
  const changed = await tx('worksheets')
    .where({ id, version })
    .update({ raw: JSON.stringify(raw), version: version + 1, saved_at: tx.fn.now() });
  return changed === 1 ? version + 1 : undefined;
}

/** Lends one's own sheet to the partner to fill in, or takes it back; false when it is not the asker's. */
export async function shareWorksheet(tx: Tx, actor: Actor, id: string, shared: boolean): Promise<boolean> {
  const changed = await tx('worksheets').where({ id, shop_id: actor.shopId }).update({ shared });
  return changed === 1;
}
