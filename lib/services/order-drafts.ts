import 'server-only';
import { begin, type Tx } from '@/db/client';
import { type DraftWords, loadDraftWords } from '@/db/read-models/draft-words';
import { isThere } from '@/db/read-models/order-page';
import { once } from '@/db/repositories/idempotency';
import {
  deleteDraft,
  type DraftLine,
  insertDraft,
  insertLines,
  insertOrderParts,
  keepReference,
  replaceLines,
  replaceParts,
  takeDraft,
  updateDraft,
} from '@/db/repositories/order-drafts';
import { newId } from '@/lib/adapters/ids';
import type { Actor, Ticket } from '@/lib/domain/actor';
import { CATALOGUE_VERSION, operationByKey } from '@/lib/domain/operations/catalogue';
import { inOrderOfWork } from '@/lib/domain/operations/order-of-work';
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
  const id = ids.orderId ?? newId();
  return keepDraft(ticket, { id, version: 0, requestKey, lineIds: ids.lineIds ?? [] }, input);
}

/** Which draft is kept, and from which version; 0 where it is not there yet. */
interface Keeping {
  readonly id: string;
  readonly version: number;
  /** Given by a form that is pressed; what is kept while typing goes by its version alone. */
  readonly requestKey?: string;
  readonly lineIds?: readonly string[];
}

/**
 * Keeps a draft as it stands on the screen: makes it the first time, changes it afterwards. Lines whose operation
 * stays keep their worksheets.
 * @throws AppError stale when somebody changed it first, not_found when it is no draft of this shop.
 */
export async function keepDraft(
  ticket: Ticket,
  { id, version, requestKey, lineIds = [] }: Keeping,
  input: DraftInput,
): Promise<{ id: string; version: number }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'order');
    const work = async () => {
      if (version === 0) await openDraft(tx, actor, { id, input, lineIds });
      else await changeDraft(tx, actor, { id, input, version });
      return { id, version: version + 1 };
    };
    if (requestKey === undefined) return work();
    return once(tx, actor, { key: requestKey, route: 'order.draft', input }, work);
  });
}

/** Keeps the asker's shop's own reference for an order; the other shop never sees it. */
export async function setReference(ticket: Ticket, orderId: string, text: string): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'message');
    if (!(await isThere(tx, orderId))) throw new AppError('not_found', 'There is no such order.');
    await keepReference(tx, actor, orderId, text);
  });
}

/** Throws a draft away. */
export async function discardDraft(ticket: Ticket, orderId: string): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'order');
    if (!(await deleteDraft(tx, orderId))) throw new AppError('not_found', 'There is no such draft.');
  });
}

interface Draft {
  readonly id: string;
  readonly input: DraftInput;
}

async function openDraft(
  tx: Tx,
  actor: Actor,
  { id, input, lineIds }: Draft & { readonly lineIds: readonly string[] },
): Promise<void> {
  if (await isThere(tx, id)) throw changed();
  const known = await namesOf(tx, actor, input);
  await insertDraft(tx, actor, { ...input, ...headOf(known, input), id, copiedFromId: null });
  await insertOrderParts(tx, id, input.partIds);
  await insertLines(tx, actor, id, linesOf(known, input, lineIds));
  await keepReference(tx, actor, id, input.reference);
}

async function changeDraft(
  tx: Tx,
  actor: Actor,
  { id, input, version }: Draft & { readonly version: number },
): Promise<void> {
  const known = await namesOf(tx, actor, input);
  const header = { ...input, ...headOf(known, input), id, copiedFromId: null };
  const before = await takeDraft(tx, id);
  if (!before) throw new AppError('not_found', 'There is no such draft.');
  if (before.version !== version) throw changed();
  await updateDraft(tx, header, before);
  const keptIds = input.operations.map(
    (key) => before.lines.find(({ operation }) => operation === key)?.id ?? newId(),
  );
  await replaceParts(tx, id, input.partIds, keptIds);
  await replaceLines(tx, actor, id, linesOf(known, input, keptIds));
  await keepReference(tx, actor, id, input.reference);
}

function changed(): AppError {
  return new AppError(
    'stale',
    'This draft was changed on another screen in the meantime. Load the page again to see it.',
  );
}

async function namesOf(tx: Tx, actor: Actor, input: DraftInput): Promise<DraftWords> {
  const known = await loadDraftWords(tx, actor, input);
  if (known.parts.length === input.partIds.length) return known;
  throw new AppError('invalid', 'A part was not found.', {
    fields: { partIds: ['Choose the parts again.'] },
  });
}

function headOf(known: DraftWords, input: DraftInput) {
  const titles = inOrderOfWork(input.operations).map((key) => operationByKey(key).title);
  const title = orderTitle(
    known.parts.map((part) => part.kind),
    titles,
  );
  const stamps = known.parts.flatMap((part) => [...part.stamps, part.makerNo]);
  const words = orderWords([title, known.engine, known.partnerName, input.reference, ...stamps]);
  return { title, words, buildId: known.buildId };
}

/** The lines in the order of work, each on the parts that its operation is for; ids go by what was asked, in its order. */
function linesOf(known: DraftWords, input: DraftInput, ids: readonly string[]): DraftLine[] {
  return inOrderOfWork(input.operations).map((key, index) => {
    const operation = operationByKey(key);
    const fitting = known.parts.filter((part) => fits(operation.part, part.kind));
    const sized = needsSizes(operation);
    return {
      ...{
        id: ids[input.operations.indexOf(key)] ?? newId(),
        position: index + 1,
        operation: key,
        title: operation.title,
      },
      ...{ needsSizes: sized, catalogueVersion: CATALOGUE_VERSION },
      partIds: (fitting.length > 0 ? fitting : known.parts).map((part) => part.id),
      worksheet: sized ? { id: newId(), raw: {} } : null,
    };
  });
}

function fits(wanted: 'crank' | 'block' | 'any', kind: string): boolean {
  return wanted === 'any' || (wanted === 'crank' ? kind === 'crankshaft' : kind === 'block');
}
