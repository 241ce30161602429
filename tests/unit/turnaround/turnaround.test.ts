import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Calendar } from '@/lib/domain/calendar/calendar';
import { bookLegs, inDays, quantile, summarise, totalOf } from '@/lib/domain/turnaround/turnaround';

const WEEK: Calendar = {
  timeZone: 'UTC',
  hours: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, opens: 480, closes: 960 })),
  closedDays: [],
};
const at = (text: string) => new Date(`2026-${text}:00Z`);

describe('booked hours', () => {
  // tests/reference/data/jobs.md, job 1: 43 h to Pellow & Dray, then 2.5 h to Ninefold.
  it('books each leg on the calendar of the shop that owed it', () => {
    const legs = [
      {
        orderId: 'o',
        bookedTo: 'sender' as const,
        calendarShopId: 'a',
        startedAt: at('11-03T11:00'),
        endedAt: at('11-10T14:00'),
      },
      {
        orderId: 'o',
        bookedTo: 'partner' as const,
        calendarShopId: 'b',
        startedAt: at('11-10T14:00'),
        endedAt: at('11-11T08:30'),
      },
      {
        orderId: 'o',
        bookedTo: 'road' as const,
        calendarShopId: 'unknown',
        startedAt: at('11-10T14:00'),
        endedAt: at('11-11T08:30'),
      },
    ];
    const booked = bookLegs(
      legs,
      new Map([
        ['a', WEEK],
        ['b', WEEK],
      ]),
    );
    expect(booked).toEqual({ sender: 43 * 60, partner: 150, road: 0, snag: 0 });
    expect(totalOf(booked)).toBe(45.5 * 60);
    expect(inDays(booked.sender, WEEK)).toBe(5.375);
  });
});

describe('the report', () => {
  it('takes the nearest rank for half and for nine in ten', () => {
    const values = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10];
    expect([quantile(values, 0.5), quantile(values, 0.9), quantile([], 0.5)]).toEqual([5, 9, null]);
  });

  it('adds shares up to one and counts on time only where something was promised', () => {
    const booked = { sender: 480, partner: 960, road: 240, snag: 0 };
    const order = { group: 'Kestrel', booked, days: 3.5 };
    const [row] = summarise(
      [
        { ...order, onTime: true },
        { ...order, onTime: null },
        { ...order, onTime: false },
      ],
      480,
    );
    expect(row).toMatchObject({
      orders: 3,
      median: 3.5,
      onTime: 0.5,
      days: { sender: 1, partner: 2, road: 0.5, snag: 0 },
    });
    expect(totalOf(row?.shares ?? booked)).toBeCloseTo(1, 12);
  });

  it('never puts half of the orders after nine in ten of them', () => {
    fc.assert(
      fc.property(fc.array(fc.nat(500), { minLength: 1 }), (days) => {
        expect(quantile(days, 0.5) ?? 0).toBeLessThanOrEqual(quantile(days, 0.9) ?? 0);
      }),
    );
  });
});
