import { describe, expect, it } from 'vitest';
import { minutesOfDay, sayWorkingTime, workingMinutes } from '@/lib/domain/calendar/calendar';

/** Monday to Friday, 8:00 to 16:00, as the shops of tests/reference/data/jobs.md work. */
const CALENDAR = {
  timeZone: 'UTC',
  hours: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, opens: 8 * 60, closes: 16 * 60 })),
  closedDays: [],
};
const between = (from: string, to: string) => workingMinutes(CALENDAR, new Date(from), new Date(to));

describe('hours of the jobs', () => {
  // Job 5: the pistons are late; the hold from Monday 10:00 to Thursday 12:00.
  it('books 6 + 8 + 8 + 4 = 26 h to the shop whose pistons are late, said as 3 d 2 h', () => {
    const minutes = between('2026-11-16T10:00Z', '2026-11-19T12:00Z');
    expect(minutes).toBe(26 * 60);
    expect(sayWorkingTime(minutes, minutesOfDay(CALENDAR))).toBe('3 d 2 h');
  });

  // Job 8: seven rods, then eight of which none is stamped 6.
  it('books 6 h 50 + 2 h 15 = 9 h 05 to the shop whose rods are missing', () => {
    const first = between('2026-11-23T09:10Z', '2026-11-23T16:00Z');
    const second = between('2026-11-24T08:00Z', '2026-11-24T10:15Z');
    expect([first, second]).toEqual([6 * 60 + 50, 2 * 60 + 15]);
    expect(between('2026-11-23T09:10Z', '2026-11-24T10:15Z')).toBe(9 * 60 + 5);
  });
});
