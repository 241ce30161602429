import 'server-only';
import { begin } from '@/db/client';
import {
  findWorksheet,
  findWorksheets,
  saveWorksheet,
  shareWorksheet,
  type WorksheetRow,
} from '@/db/repositories/worksheets';
import { findHouse } from '@/db/repositories/shops';
import type { Ticket } from '@/lib/domain/actor';
import type { Made } from '@/lib/domain/builds/made';
import { findPreset } from '@/lib/domain/builds/presets';
import type { ReleasedLine } from '@/lib/domain/orders/commands';
import { releasedLine } from '@/lib/domain/sizes/release';
import { AppError } from '@/lib/errors';
import { commandIn, type OrderCommandAnswer } from '@/lib/services/order-commands';
import { requirePermission } from '@/lib/services/permission';

/** Parts with no build are drawn as a single: features are then named by hand. */
const NO_BUILD = findPreset('single');

/** How the part of a sheet is made. */
export function madeOf(sheet: Pick<WorksheetRow, 'made'>): Made {
  const made = sheet.made ?? NO_BUILD;
  if (!made) throw new RangeError('No configuration');
  return made;
}

/** Keeps what was typed on a sheet. @throws AppError stale with what stands now when somebody saved it first. */
export async function keepWorksheet(
  ticket: Ticket,
  id: string,
  version: number,
  raw: Readonly<Record<string, string>>,
): Promise<{ version: number }> {
  return begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'sizes');
    const saved = await saveWorksheet(tx, id, version, raw);
    if (saved !== undefined) return { version: saved };
    const current = await findWorksheet(tx, id);
    if (!current) throw new AppError('not_found', 'There is no such sheet.');
    throw new AppError('stale', 'Somebody else wrote on this sheet in the meantime.', {
      current: { version: current.version, raw: current.raw },
    });
  });
}

/** Asks the partner to fill a sheet in, or takes it back. */
export async function lendWorksheet(ticket: Ticket, id: string, shared: boolean): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'sizes');
    if (!(await shareWorksheet(tx, actor, id, shared)))
      throw new AppError('not_found', 'There is no such sheet.');
  });
}

/**
 * Releases the sizes of an order's finished sheets as the next rev. Sheets that nobody has begun are left out.
 * @throws AppError invalid naming the sheet that is begun and not finished.
 */
export async function releaseSizes(
  ticket: Ticket,
  input: {
    readonly orderId: string;
    readonly expectedVersion: number;
    readonly requestKey: string;
    readonly reason: string;
  },
): Promise<OrderCommandAnswer> {
  return begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'sizes');
    const sheets = await findWorksheets(tx, input.orderId);
    const house = await findHouse(tx, actor.shopId);
    const begun = sheets.filter((sheet) => Object.values(sheet.raw).some((text) => text !== ''));
    const lines: ReleasedLine[] = begun.map((sheet) => {
      const line = releasedLine(sheet.lineId, sheet, { made: madeOf(sheet), unit: actor.unit, house });
      if (!line)
        throw new AppError(
          'invalid',
          'A sheet is begun and not finished, or something on it is questioned. Finish it, or empty it.',
        );
      return line;
    });
    return commandIn(tx, actor, { ...input, command: { do: 'release', lines, reason: input.reason } });
  });
}
