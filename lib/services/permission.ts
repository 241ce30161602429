import 'server-only';
import { type Actor, can, type Permission } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';

/** @throws AppError forbidden when none of the actor's roles holds the permission. */
export function requirePermission(actor: Actor, permission: Permission): void {
  if (!can(actor, permission)) throw new AppError('forbidden', 'Your role in this shop does not allow it.');
}
