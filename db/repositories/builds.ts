import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { Made } from '@/lib/domain/builds/made';

/** A build as it is written down. */
export interface BuildRow {
  readonly id: string;
  readonly engine: string;
  readonly made: Made;
  readonly customerName: string | null;
  readonly notes: string;
  readonly neededOn: string | null;
}

/** A part as it is written down. `stamps` is empty, or one a piece. */
export interface PartRow {
  readonly id: string;
  readonly buildId: string | null;
  readonly kind: string;
  readonly makerNo: string;
  readonly stamps: readonly string[];
  readonly pieces: number;
  readonly condition: string;
}

/** Adds a build under the shop's next number; answers the number. */
export async function insertBuild(tx: Tx, actor: Actor, build: BuildRow): Promise<number> {
  const { rows } = await tx.raw<{ rows: { number: number }[] }>(
    `insert into builds (id, shop_id, number, engine, made, customer_name, notes, needed_on)
     values (?, ?, next_number('build'), ?, ?::jsonb, ?, ?, ?) returning number`,
    [
      build.id,
      actor.shopId,
      build.engine,
      JSON.stringify(build.made),
      build.customerName,
      build.notes,
      build.neededOn,
    ],
  );
  return rows[0]?.number ?? 0;
}

/** Changes a build if it is still the version seen; false when somebody changed it first. */
export async function updateBuild(tx: Tx, actor: Actor, build: BuildRow, version: number): Promise<boolean> {
  const changed = await tx('builds')
    .where({ id: build.id, shop_id: actor.shopId, version })
    .update({
      ...{ engine: build.engine, made: JSON.stringify(build.made), customer_name: build.customerName },
      ...{ notes: build.notes, needed_on: build.neededOn, version: version + 1 },
    });
  return changed === 1;
}

/** Adds a part of the shop's, to a build or to none. */
export async function insertPart(tx: Tx, actor: Actor, part: PartRow): Promise<void> {
  await tx('parts').insert({
    ...{
      id: part.id,
      shop_id: actor.shopId,
      build_id: part.buildId,
      kind: part.kind,
      maker_no: part.makerNo,
    },
    ...{ stamp: part.stamps.join(' '), stamps: part.stamps, pieces: part.pieces, condition: part.condition },
  });
}
