import 'server-only';
import { begin } from '@/db/client';
import { findFacts, lockOrder } from '@/db/repositories/order-facts';
import { writeEvents } from '@/db/repositories/order-log';
import { drawLogPlace, insertReadings, type ReadingRow } from '@/db/repositories/readings';
import { now } from '@/lib/adapters/clock';
import type { Ticket } from '@/lib/domain/actor';
import type { Facts } from '@/lib/domain/orders/facts';
import { comparatorSize } from '@/lib/domain/readings/judge';
import { AppError } from '@/lib/errors';
import type { ReadingInput } from '@/lib/schemas/readings';
import { requirePermission } from '@/lib/services/permission';

/**
 * Keeps a batch of readings, each exactly once by its own id. Readings are facts: they are always taken, and marked
 * when taken while stopped or before the sizes were repeated back. The partner's prove the cut, the sender's are checks.
 */
export async function postReadings(
  ticket: Ticket,
  orderId: string,
  inputs: readonly ReadingInput[],
  marks: readonly string[] = [],
): Promise<{ kept: string[] }> {
  return begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'readings');
    const facts = (await lockOrder(tx, orderId)) ? await findFacts(tx, orderId) : undefined;
    if (!facts || facts.status === 'draft') throw new AppError('not_found', 'There is no such order.');
    if (facts.moves.every((move) => move.kind !== 'checked_in')) {
      throw new AppError('conflict', 'The parts have not been checked in yet, so nothing can be read.');
    }
    const isSender = facts.sender.shopId === actor.shopId;
    const rows = inputs.map((input) => toRow(facts, input, { isSender, marks }));
    const kept = await insertReadings(tx, actor, orderId, rows);
    if (kept.length > 0) {
      await drawLogPlace(tx, orderId);
      const event = {
        type: 'order.readings',
        payload: { count: kept.length, purpose: rows[0]?.purpose, stage: rows[0]?.stage },
      };
      const logged = {
        tx,
        actor,
        side: isSender ? ('sender' as const) : ('partner' as const),
        now: now().toISOString(),
      };
      const read = rows
        .filter((row) => row.purpose === 'cut')
        .map(({ lineId, round, feature, position }) => ({ lineId, round, place: `${feature}|${position}` }));
      await writeEvents(logged, { id: orderId, logSeq: facts.logSeq }, [event], { read });
    }
    return { kept };
  });
}

function toRow(
  facts: Facts,
  input: ReadingInput,
  { isSender, marks }: { readonly isSender: boolean; readonly marks: readonly string[] },
): ReadingRow {
  const line = facts.lines.find((one) => one.id === input.lineId);
  if (!line) throw new AppError('invalid', 'That line is not on this order.');
  const size = input.comparator
    ? comparatorSize(input.comparator.setTo, input.comparator.away, input.comparator.side)
    : input.size;
  return {
    ...{
      id: input.id,
      lineId: input.lineId,
      feature: input.feature,
      position: input.position,
      typedText: input.typedText,
    },
    ...{
      unit: input.unit,
      comparator: input.comparator,
      size,
      instrument: input.instrument,
      partMc: input.partMc,
      temperatureText: input.temperatureText,
      replacesId: input.replacesId,
    },
    ...{ purpose: isSender ? 'check' : input.stage === 'found' ? 'found' : 'cut', stage: input.stage },
    ...{
      round: facts.round,
      rev: facts.latestRev,
      takenAt: input.takenAt,
      marks: [...(line.stopDue ? ['while stopped'] : []), ...marks],
    },
  };
}
