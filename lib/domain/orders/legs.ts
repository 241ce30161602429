import type { Clock, Facts } from '@/lib/domain/orders/facts';
import type { Stand } from '@/lib/domain/orders/stand';

/** Where the hours are booked from a moment on, and on whose calendar they are counted. */
export interface Leg {
  readonly bookedTo: Exclude<Clock, 'none'>;
  readonly calendarShopId: string;
  readonly round: number;
}

/**
 * What becomes of the running leg: undefined while the clock stays where it is, null when it stops, or the leg
 * that begins.
 */
export function nextLeg(
  before: Pick<Facts, 'clock' | 'round'>,
  after: Facts,
  stand: Stand,
): Leg | null | undefined {
  if (stand.clock === before.clock && after.round === before.round) return undefined;
  if (stand.clock === 'none') return null;
  return { bookedTo: stand.clock, calendarShopId: calendarShop(after, stand), round: after.round };
}

/** A leg's hours are working hours of the side named, of the receiver on the road, of who must answer a snag. */
function calendarShop(facts: Facts, { clock, partnerStep }: Stand): string {
  const isPartners = clock === 'partner' || ((clock === 'road' || clock === 'snag') && partnerStep !== null);
  return isPartners ? (facts.partner?.shopId ?? facts.sender.shopId) : facts.sender.shopId;
}
