import 'server-only';
import { beginUnknown } from '@/db/client';
import { beginReset, takeReset, takeTry } from '@/db/repositories/identity';
import { putTask, tellReset } from '@/db/repositories/notices';
import { newId } from '@/lib/adapters/ids';
import { linkSecret } from '@/lib/adapters/links';
import { AppError } from '@/lib/errors';
import { hashNewPassword, normalEmail, tokenHash } from '@/lib/services/identity';

/**
 * Sends a link for a new password, if the address has an account. Answers nothing either way, so that nobody learns whether
 * it has. @throws AppError rate_limited after five tries for one address in an hour.
 */
export async function askForReset(email: string): Promise<void> {
  const norm = normalEmail(email);
  await beginUnknown(async (tx) => {
    if (!(await takeTry(tx, `reset:${norm}`, 5, 3600)))
      throw new AppError('rate_limited', 'Too many tries. Wait an hour.');
    const resetId = newId();
    const known = await beginReset(tx, {
      id: resetId,
      email: norm,
      tokenHash: tokenHash(linkSecret('reset', resetId)),
    });
    const noticeId = newId();
    if (known) await tellReset(tx, { id: noticeId, email: norm, resetId });
    // The task is queued either way and takes as long; without a notice it finds nothing to send.
    await putTask(tx, 'send_notice', { noticeId });
  });
}

/** Sets a new password by the link, once, and ends every sign-in of the person. @throws AppError not_found for a used or old link. */
export async function setNewPassword(secret: string, password: string): Promise<void> {
  const passwordHash = await hashNewPassword(password);
  const taken = await beginUnknown((tx) => takeReset(tx, tokenHash(secret), passwordHash));
  if (!taken) throw new AppError('not_found', 'This link has been used or is too old. Ask for a new one.');
}
