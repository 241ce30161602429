import 'server-only';
import { begin } from '@/db/client';
import { loadLogged, type LoggedOrder } from '@/db/read-models/order-log';
import type { Ticket } from '@/lib/domain/actor';
import { fold, type Folded } from '@/lib/domain/orders/fold';

/** What tables and log disagree about on one order. */
export interface LogDifference {
  readonly orderId: string;
  readonly about: readonly string[];
}

/**
 * Rebuilds the orders that a shop has sent, or every nth of them, from their logs and compares them with the tables.
 * Answers the differences, how many orders were rebuilt, and how many are older than the log's keeping of deeds.
 */
export async function checkLogs(
  ticket: Ticket,
  every = 1,
): Promise<{ checked: number; older: number; differences: LogDifference[] }> {
  const differences: LogDifference[] = [];
  let [checked, older, after] = [0, 0, '00000000-0000-0000-0000-000000000000'];
  for (;;) {
    const from = after;
    const page = await begin(ticket, (tx, actor) =>
      loadLogged(tx, actor, { after: from, limit: 200, every }),
    );
    for (const order of page) {
      const folded = fold(order.log);
      if (!folded) {
        older += 1;
        continue;
      }
      checked += 1;
      const about = differencesOf(order.says, folded);
      if (about.length > 0) differences.push({ orderId: order.orderId, about });
    }
    const last = page.at(-1);
    if (!last) return { checked, older, differences };
    after = last.orderId;
  }
}

function differencesOf(says: LoggedOrder['says'], { facts, stand, legs }: Folded): string[] {
  const told: Record<string, unknown> = {
    ...{ status: facts.status, round: facts.round, latestRev: facts.latestRev, promisedOn: facts.promisedOn },
    ...{ punches: stand.punches, stopped: stand.stopped, clear: stand.clear, clock: stand.clock },
    ...{ senderStep: stand.senderStep, partnerStep: stand.partnerStep, legs: legs.map(timed) },
  };
  const kept: Record<string, unknown> = { ...says, legs: says.legs.map(timed) };
  return Object.keys(told).filter((name) => !isEqual(told[name], kept[name]));
}

/** A leg with its moments as numbers: the same moment may be written in two ways. */
function timed<T extends { readonly startedAt: string; readonly endedAt: string | null }>(leg: T) {
  return { ...leg, startedAt: instant(leg.startedAt), endedAt: instant(leg.endedAt) };
}

function instant(at: string | null): number | null {
  return at === null ? null : new Date(at).getTime();
}

/** Equal as JSON whatever the order of names. */
function isEqual(one: unknown, other: unknown): boolean {
  return JSON.stringify(sorted(one)) === JSON.stringify(sorted(other));
}

function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).toSorted(([a], [b]) => (a < b ? -1 : 1));
  return Object.fromEntries(entries.map(([name, inner]) => [name, sorted(inner)]));
}
