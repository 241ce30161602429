import 'server-only';
import { newId } from '@/lib/adapters/ids';
import { AppError } from '@/lib/errors';
import { runOrderCommand } from '@/lib/services/order-commands';
import { findOwnerOf } from '@/lib/services/people';

/** Lets a price run out on the day after its last one. A price answered meanwhile is left alone. */
export async function expireQuote(ref: {
  readonly orderId: string;
  readonly revision: number;
  readonly shopId: string;
}): Promise<void> {
  const personId = await findOwnerOf(ref.shopId);
  if (personId === undefined) return;
  try {
    await runOrderCommand(
      { personId, shopId: ref.shopId },
      {
        orderId: ref.orderId,
        expectedVersion: null,
        requestKey: newId(),
        command: { do: 'expire', revision: ref.revision },
      },
    );
  } catch (error) {
    if (error instanceof AppError && (error.code === 'invalid' || error.code === 'conflict')) return;
    throw error;
  }
}
