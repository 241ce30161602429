import 'server-only';
import { begin } from '@/db/client';
import { keepNote, setPartnership } from '@/db/repositories/partnerships';
import type { Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';
import { writeToInvited } from '@/lib/services/invitations';
import { requirePermission } from '@/lib/services/permission';

/**
 * Pauses a partnership, takes it up again, or ends it. Orders that are under way go on; no new one can be sent while
 * it is paused or ended. @throws AppError stale when the other shop changed it first.
 */
export async function changePartnership(
  ticket: Ticket,
  partnerShopId: string,
  version: number,
  state: 'active' | 'paused' | 'ended',
): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'partners');
    if (await setPartnership(tx, actor, { partnerShopId, version, state })) return;
    throw new AppError(
      'stale',
      'This was changed in the meantime. Look at what stands now, then press again.',
    );
  });
}

/** Keeps what a shop notes for itself about a partner; the partner never sees it. */
export async function notePartner(ticket: Ticket, partnerShopId: string, text: string): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'message');
    if (!(await keepNote(tx, actor, partnerShopId, text)))
      throw new AppError('not_found', 'That shop is not a partner.');
  });
}

/** Sends the way in once more to a partner that has not come in yet. */
export async function remindPartner(ticket: Ticket, partnerShopId: string): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'partners');
    if (!(await writeToInvited(tx, actor, partnerShopId)))
      throw new AppError('conflict', 'That shop has come in already.');
  });
}
