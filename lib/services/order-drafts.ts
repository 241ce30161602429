import 'server-only';
import { begin, type Tx } from '@/db/client';
import { loadDraftWords } from '@/db/read-models/draft-words';
import { once } from '@/db/repositories/idempotency';
import {
  deleteDraft,
  type DraftLine,
  insertDraft,
  insertLines,
  insertOrderParts,
  keepReference,
} from '@/db/repositories/order-drafts';
import { newId } from '@/lib/adapters/ids';
import type { Actor, Ticket } from '@/lib/domain/actor';
import { CATALOGUE_VERSION, operationByKey } from '@/lib/domain/operations/catalogue';
import { needsSizes } from '@/lib/domain/operations/operation';
import { orderTitle, orderWords } from '@/lib/domain/orders/words';
import { AppError } from '@/lib/errors';
import type { DraftInput } from '@/lib/schemas/order-draft';
import { requirePermission } from '@/lib/services/permission';

/** Ids given by the caller where they must be known beforehand. */
interface Ids {
  readonly orderId?: string;
  readonly lineIds?: readonly string[];
}

/** Opens a draft with its parts, lines and empty worksheets. Nobody outside the shop sees it. */
export async function createDraft(
  ticket: Ticket,
  requestKey: string,
  input: DraftInput,
  ids: Ids = {},
): Promise<{ id: string }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'order');
    return once(tx, actor, { key: requestKey, route: 'order.draft', input }, async () => {
      const id = ids.orderId ?? newId();
      await writeDraft(tx, actor, { id, input, lineIds: ids.lineIds ?? [] });
      return { id };
    });
  });
}

/** Throws a draft away. */
export async function discardDraft(ticket: Ticket, orderId: string): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'order');
    if (!(await deleteDraft(tx, orderId))) throw new AppError('not_found', 'There is no such draft.');
  });
}

async function writeDraft(
  tx: Tx,
  actor: Actor,
  draft: { id: string; input: DraftInput; lineIds: readonly string[] },
): Promise<void> {
  const { id, input } = draft;
  const known = await loadDraftWords(tx, actor, input);
  if (known.parts.length !== input.partIds.length)
    throw new AppError('invalid', 'A part was not found.', {
      fields: { partIds: ['Choose the parts again.'] },
    });
  const kinds = known.parts.map((part) => part.kind);
  const operations = input.operations.map(operationByKey);
  const title = orderTitle(
    kinds,
    operations.map((operation) => operation.title),
  );
  const words = orderWords([
    title,
    known.engine,
    known.partnerName,
    input.reference,
    ...known.parts.flatMap((part) => [part.stamp, part.makerNo]),
  ]);
  await insertDraft(tx, actor, { ...input, id, title, words, buildId: known.buildId, copiedFromId: null });
  await insertOrderParts(tx, id, input.partIds);
  const lines = operations.map((operation, index): DraftLine => {
    const fitting = known.parts.filter((part) => fits(operation.part, part.kind));
    const sized = needsSizes(operation);
    return {
      ...{
        id: draft.lineIds[index] ?? newId(),
        operation: operation.key,
        title: operation.title,
        needsSizes: sized,
      },
      catalogueVersion: CATALOGUE_VERSION,
      partIds: (fitting.length > 0 ? fitting : known.parts).map((part) => part.id),
      worksheet: sized ? { id: newId(), raw: {} } : null,
    };
  });
  await insertLines(tx, actor, id, lines);
  if (input.reference !== '') await keepReference(tx, actor, id, input.reference);
}

function fits(wanted: 'crank' | 'block' | 'any', kind: string): boolean {
  return wanted === 'any' || (wanted === 'crank' ? kind === 'crankshaft' : kind === 'block');
}
