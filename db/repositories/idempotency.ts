import 'server-only';
import { createHash } from 'node:crypto';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';

/** What makes two copies of one request the same. */
export interface Once {
  readonly key: string;
  readonly route: string;
  readonly input: unknown;
}

/**
 * Does the work once for each key. The key's row goes in first, in the same transaction: a second copy waits for
 * the first and gets its answer; a refusal leaves no key, so the same form can be mended and sent again.
 * @throws AppError invalid when the key was used with other input.
 */
export async function once<T>(
  tx: Tx,
  actor: Actor,
  { key, route, input }: Once,
  work: () => Promise<T>,
): Promise<T> {
  const fingerprint = createHash('sha256').update(JSON.stringify(input)).digest('hex');
  const { rows } = await tx.raw<{ rows: unknown[] }>(
    `insert into idempotency_keys (person_id, shop_id, route, key, fingerprint) values (?, ?, ?, ?, ?)
     on conflict do nothing returning 1`,
    [actor.personId, actor.shopId, route, key, fingerprint],
  );
  if (rows.length === 0) return replay<T>(tx, actor, { key, route, fingerprint });
  const answer = await work();
  await tx('idempotency_keys')
    .where({ person_id: actor.personId, route, key })
    .update({ answer: JSON.stringify(answer ?? null) });
  return answer;
}

async function replay<T>(
  tx: Tx,
  actor: Actor,
  known: { key: string; route: string; fingerprint: string },
): Promise<T> {
  const row = await tx<{ person_id: string; route: string; key: string; fingerprint: string; answer: T }>(
    'idempotency_keys',
  )
    .where({ person_id: actor.personId, route: known.route, key: known.key })
    .first('fingerprint', 'answer');
  if (row?.fingerprint !== known.fingerprint) {
    throw new AppError('invalid', 'This was sent before with other content. Load the page again.');
  }
  return row.answer;
}
