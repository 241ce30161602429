import type { Calendar } from '@/lib/domain/calendar/calendar';
import { minutesOfDay, workingMinutes } from '@/lib/domain/calendar/calendar';

/** Whom an hour of an order is booked to. */
export type BookedTo = 'sender' | 'partner' | 'road' | 'snag';

/** One stretch of an order in which the clock ran for one of them. */
export interface Leg {
  readonly orderId: string;
  readonly bookedTo: BookedTo;
  readonly calendarShopId: string;
  readonly startedAt: Date;
  readonly endedAt: Date;
}

/** Working minutes by whom they are booked to; they add up to the order's working time. */
export type Booked = Readonly<Record<BookedTo, number>>;

/** Adds an order's legs up, each on the calendar of the shop that owed it. */
export function bookLegs(legs: readonly Leg[], calendars: ReadonlyMap<string, Calendar>): Booked {
  const booked = { sender: 0, partner: 0, road: 0, snag: 0 };
  for (const leg of legs) {
    const calendar = calendars.get(leg.calendarShopId);
    if (calendar) booked[leg.bookedTo] += workingMinutes(calendar, leg.startedAt, leg.endedAt);
  }
  return booked;
}

/** The whole of it. */
export function totalOf(booked: Booked): number {
  return booked.sender + booked.partner + booked.road + booked.snag;
}

/**
 * The value at or below which a share of the values lies (nearest rank: the smallest that leaves no more than 1 − share
 * above). Null for none.
 */
export function quantile(values: readonly number[], share: number): number | null {
  if (values.length === 0) return null;
  const sorted = values.toSorted((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? null;
}

/** A finished order as the report sees it. */
export interface FinishedOrder {
  readonly group: string;
  readonly booked: Booked;
  readonly days: number;
  /** Ready by the first agreed promise; null where none was given. */
  readonly onTime: boolean | null;
}

export interface TurnaroundRow {
  readonly group: string;
  readonly orders: number;
  readonly median: number;
  readonly nineInTen: number;
  /** Share on time of those that were promised; null without a promise. */
  readonly onTime: number | null;
  /** Working days an order on average, by whose move. */
  readonly days: Booked;
  /** Share of all working minutes, by whose move. */
  readonly shares: Booked;
}

/** One row a group: orders, half by, nine in ten by, on time, and whose move the days went on. */
export function summarise(orders: readonly FinishedOrder[], dayLength: number): TurnaroundRow[] {
  const groups = new Map<string, FinishedOrder[]>();
  for (const order of orders) groups.set(order.group, [...(groups.get(order.group) ?? []), order]);
  return [...groups.entries()]
    .map(([group, members]) => summariseGroup(group, members, dayLength))
    .toSorted((a, b) => b.orders - a.orders || a.group.localeCompare(b.group));
}

function summariseGroup(group: string, members: readonly FinishedOrder[], dayLength: number): TurnaroundRow {
  const days = members.map((order) => order.days);
  const promised = members.filter((order) => order.onTime !== null);
  const sum = (key: BookedTo) => members.reduce((all, order) => all + order.booked[key], 0);
  const sums = { sender: sum('sender'), partner: sum('partner'), road: sum('road'), snag: sum('snag') };
  const total = Math.max(1, totalOf(sums));
  const each = (scale: number) => ({
    sender: sums.sender / scale,
    partner: sums.partner / scale,
    road: sums.road / scale,
    snag: sums.snag / scale,
  });
  return {
    group,
    orders: members.length,
    median: quantile(days, 0.5) ?? 0,
    nineInTen: quantile(days, 0.9) ?? 0,
    onTime: promised.length === 0 ? null : promised.filter((order) => order.onTime).length / promised.length,
    days: each(dayLength * members.length),
    shares: each(total),
  };
}

/** Working days of an order on one calendar's day length. */
export function inDays(minutes: number, calendar: Calendar): number {
  return minutes / minutesOfDay(calendar);
}
