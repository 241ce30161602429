import 'server-only';
import { begin } from '@/db/client';
import { loadAlreadyCut } from '@/db/read-models/already-cut';
import {
  findWorksheet,
  findWorksheets,
  saveWorksheet,
  shareWorksheet,
  type WorksheetRow,
} from '@/db/repositories/worksheets';
import { findHouse } from '@/db/repositories/shops';
import type { Actor, Ticket } from '@/lib/domain/actor';
import type { Made } from '@/lib/domain/builds/made';
import { findPreset } from '@/lib/domain/builds/presets';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import type { House } from '@/lib/domain/operations/house';
import type { ReleasedLine } from '@/lib/domain/orders/commands';
import { standsAlready } from '@/lib/domain/orders/deeds/sizes';
import type { Facts } from '@/lib/domain/orders/facts';
import {
  type CutFeature,
  type MadeOfCut,
  madeOfCut,
  PAST_DECISIONS,
  type PastDecision,
} from '@/lib/domain/sizes/already-cut';
import { releasedLine, workSheet } from '@/lib/domain/sizes/release';
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
    /** What becomes of features that the new limits leave past size; needed only where there are any. */
    readonly past?: PastDecision | undefined;
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
    const { past, reason, ...press } = input;
    const { cut } = await loadAlreadyCut(tx, input.orderId);
    const made = begun.flatMap((sheet) => previewOf(cut, sheet, { unit: actor.unit, house }));
    const decided = decidePast(
      made.filter(({ is }) => is.state === 'past'),
      past,
    );
    const why = [reason.replace(/[.\s]+$/, ''), decided].filter((words) => words !== '').join('. ');
    return commandIn(tx, actor, { ...press, command: { do: 'release', lines, reason: why } });
  });
}

/** What a sheet as it stands would make of what is cut already; nothing while it is not finished. */
export function previewOf(
  cut: readonly CutFeature[],
  sheet: Pick<WorksheetRow, 'lineId' | 'operation' | 'raw' | 'made'>,
  from: { readonly unit: Actor['unit']; readonly house: House },
): readonly MadeOfCut[] {
  const made = madeOf(sheet);
  const { filled, worked } = workSheet(sheet.operation, sheet.raw, { ...from, made });
  if (!worked) return [];
  const atHand = { operation: operationByKey(sheet.operation), made, figures: filled.figures };
  return madeOfCut(cut, { lineId: sheet.lineId, sizes: worked.sizes }, atHand);
}

/** Whether a sheet says what stands already; one that is begun and not finished does not. */
export function isReleased(
  facts: Facts,
  sheet: Pick<WorksheetRow, 'lineId' | 'operation' | 'raw' | 'made'>,
  from: { readonly unit: Actor['unit']; readonly house: House },
): boolean {
  const line = releasedLine(sheet.lineId, sheet, { ...from, made: madeOf(sheet) });
  return line !== null && standsAlready(facts, line);
}

/** Says what was decided about features past size. @throws AppError invalid when that is still open. */
function decidePast(past: readonly MadeOfCut[], decision: PastDecision | undefined): string {
  if (past.length === 0) return '';
  const which = past.map(({ what, feature }) => `${what.toLowerCase()} ${feature}`).join(', ');
  if (decision !== undefined) return `Past size at these limits: ${which}; ${PAST_DECISIONS[decision].said}.`;
  throw new AppError(
    'invalid',
    `Cut already, and past size at the new limits: ${which}. Decide on them first.`,
    {
      fields: { past: ['Decide what becomes of what is past size.'] },
    },
  );
}
