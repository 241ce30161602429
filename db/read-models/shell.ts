import 'server-only';
import { type AskerRow, beginUnknown, toActor } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';

/** What the frame around every page shows. */
export interface ShellView {
  readonly actor: Actor;
  readonly shops: readonly { readonly id: string; readonly name: string }[];
  readonly colleagues: readonly { readonly id: string; readonly name: string }[];
}

/**
 * The person, their shops and the colleagues who may take over this screen: one statement, together with the
 * question who is asking.
 * @throws AppError unauthenticated when the sign-in has ended.
 */
export async function loadShell(ticket: { readonly tokenHash: string }): Promise<ShellView> {
  const shell = await beginUnknown(async (tx) => {
    const { rows } = await tx.raw<{
      rows: { shell: (Omit<ShellView, 'actor'> & { asker: AskerRow }) | null }[];
    }>('select app_shell(?) as shell', [ticket.tokenHash]);
    return rows[0]?.shell;
  });
  const actor = toActor(shell?.asker);
  if (!shell || !actor) throw new AppError('unauthenticated', 'Please sign in.');
  return { actor, shops: shell.shops, colleagues: shell.colleagues };
}
