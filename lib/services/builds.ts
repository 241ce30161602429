import 'server-only';
import { begin } from '@/db/client';
import { insertBuild, insertPart, updateBuild } from '@/db/repositories/builds';
import { once } from '@/db/repositories/idempotency';
import { newId } from '@/lib/adapters/ids';
import { requirePermission } from '@/lib/services/permission';
import type { Ticket } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';
import type { BuildInput, PartInput } from '@/lib/schemas/build';

/** Opens a build. */
export async function createBuild(
  ticket: Ticket,
  requestKey: string,
  input: BuildInput,
  id = newId(),
): Promise<{ id: string }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'builds');
    return once(tx, actor, { key: requestKey, route: 'build.create', input }, async () => {
      const { preset, ...rest } = input;
      await insertBuild(tx, actor, { ...rest, id, made: preset });
      return { id };
    });
  });
}

/** Changes a build. @throws AppError stale when somebody changed it first. */
export async function changeBuild(
  ticket: Ticket,
  buildId: string,
  version: number,
  input: BuildInput,
): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'builds');
    const { preset, ...rest } = input;
    if (await updateBuild(tx, actor, { ...rest, id: buildId, made: preset }, version)) return;
    throw new AppError(
      'stale',
      'The build was changed in the meantime. Look at what stands now, then save again.',
    );
  });
}

/** Adds a part to a build, or to none. */
export async function addPart(
  ticket: Ticket,
  requestKey: string,
  { buildId, ...input }: PartInput & { buildId: string | null },
  id = newId(),
): Promise<{ id: string }> {
  return begin(ticket, (tx, actor) => {
    requirePermission(actor, 'builds');
    return once(tx, actor, { key: requestKey, route: 'part.add', input: { buildId, ...input } }, async () => {
      await insertPart(tx, actor, { ...input, id, buildId });
      return { id };
    });
  });
}
