import 'server-only';
import { begin } from '@/db/client';
import { endMembership, replaceHours, updateShop } from '@/db/repositories/shops';
import type { ShopUnit, Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';
import { requirePermission } from '@/lib/services/permission';

interface ShopSettings {
  readonly name: string;
  readonly unit: ShopUnit;
  readonly timeZone: string;
  readonly opens: string;
  readonly closes: string;
}

/** Changes the shop. @throws AppError stale when somebody changed it first. */
export async function changeShop(ticket: Ticket, version: number, settings: ShopSettings): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'settings');
    if (!(await updateShop(tx, actor, version, settings))) {
      throw new AppError(
        'stale',
        'The settings were changed in the meantime. Look at what stands now, then keep again.',
      );
    }
    await replaceHours(tx, actor, settings.opens, settings.closes);
  });
}

/** Takes a person out of the shop; their next request finds nobody. @throws AppError conflict for the last owner. */
export async function removePerson(ticket: Ticket, personId: string): Promise<void> {
  try {
    await begin(ticket, async (tx, actor) => {
      requirePermission(actor, 'people');
      if (!(await endMembership(tx, actor, personId)))
        throw new AppError('not_found', 'That person is not in this shop.');
    });
  } catch (error) {
    if (error instanceof Error && 'constraint' in error && error.constraint === 'shops_keep_an_owner') {
      throw new AppError('conflict', 'A shop keeps at least one owner.');
    }
    throw error;
  }
}
