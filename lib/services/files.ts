import 'server-only';
import { createHash } from 'node:crypto';
import { begin } from '@/db/client';
import { findFile, insertFile } from '@/db/repositories/files';
import { findFacts } from '@/db/repositories/order-facts';
import { signFileLink, storeFile } from '@/lib/adapters/files';
import { newId, newSecret } from '@/lib/adapters/ids';
import { cleanImage } from '@/lib/adapters/images';
import type { Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';
import { requirePermission } from '@/lib/services/permission';

/** What a file is, told by its first bytes and never by its name. */
function kindOf(bytes: Buffer): 'picture' | 'pdf' | null {
  if (bytes.subarray(0, 5).toString('latin1') === '%PDF-') return 'pdf';
  const head = bytes.subarray(0, 12);
  const isJpeg = head[0] === 0xff && head[1] === 0xd8;
  const isPng = head.subarray(1, 4).toString('latin1') === 'PNG';
  const isWebp =
    head.subarray(0, 4).toString('latin1') === 'RIFF' && head.subarray(8, 12).toString('latin1') === 'WEBP';
  return isJpeg || isPng || isWebp ? 'picture' : null;
}

/**
 * Keeps a file of an order: pictures are made anew before they are stored, so that nothing the camera wrote goes along.
 * No transaction is open while bytes travel. @throws AppError invalid for other kinds, not_found outside one's orders.
 */
export async function keepFile(
  ticket: Ticket,
  orderId: string,
  file: { readonly name: string; readonly bytes: Buffer },
): Promise<{ id: string }> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'message');
    if (!(await findFacts(tx, orderId))) throw new AppError('not_found', 'There is no such order.');
  });
  const kind = kindOf(file.bytes);
  if (kind === null) throw new AppError('invalid', 'Send a picture as JPEG, PNG or WebP, or a PDF.');
  const key = `orders/${orderId}/${newSecret()}`;
  const stored =
    kind === 'pdf'
      ? { bytes: file.bytes, type: 'application/pdf', width: null, height: null, small: null }
      : await cleanImage(file.bytes);
  await storeFile(key, stored.bytes, stored.type);
  if (stored.small !== null) await storeFile(`${key}-small`, stored.small, 'image/webp');
  const id = newId();
  const { type, width, height, bytes } = stored;
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  const row = {
    id,
    orderId,
    key,
    name: file.name.slice(0, 120),
    type,
    bytes: bytes.length,
    sha256,
    width,
    height,
    thumbKey: stored.small === null ? null : `${key}-small`,
  };
  await begin(ticket, (tx, actor) => insertFile(tx, actor, row));
  return { id };
}

/** A link to a file that opens for a minute. @throws AppError not_found for a file the asker may not see. */
export async function openFile(ticket: Ticket, id: string, isSmall: boolean): Promise<string> {
  const file = await begin(ticket, (tx) => findFile(tx, id));
  if (!file) throw new AppError('not_found', 'There is no such file.');
  const thumb = isSmall ? file.thumbKey : null;
  return signFileLink(thumb ?? file.key, file.name, thumb === null ? file.type : 'image/webp');
}
