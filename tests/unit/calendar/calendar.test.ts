import { describe, expect, it } from 'vitest';
import {
  type Calendar,
  dayAt,
  minutesOfDay,
  sayWorkingTime,
  workingDayAfter,
  workingMinutes,
} from '@/lib/domain/calendar/calendar';

const WEEK: Calendar = {
  timeZone: 'UTC',
  hours: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, opens: 8 * 60, closes: 16 * 60 })),
  closedDays: [],
};
const at = (text: string) => new Date(`2026-${text}:00Z`);

describe('working time', () => {
  // Hours booked in tests/reference/data/jobs.md, jobs 1, 5 and 8.
  it.each([
    ['11-03T11:00', '11-10T14:00', 43 * 60],
    ['11-10T14:00', '11-11T08:30', 150],
    ['11-16T10:00', '11-19T12:00', 26 * 60],
    ['11-23T09:10', '11-24T10:15', 545],
    ['11-21T09:00', '11-22T12:00', 0],
    ['11-10T14:00', '11-10T13:00', 0],
  ])('from %s to %s is %i minutes', (from, to, minutes) => {
    expect(workingMinutes(WEEK, at(from), at(to))).toBe(minutes);
  });

  it('counts a promise from clear to cut: Wed 11 Nov and six working days is Thu 19 Nov', () => {
    expect(workingDayAfter(WEEK, at('11-11T08:30'), 6)).toBe('2026-11-19');
  });

  it('leaves closed days out', () => {
    const closed = { ...WEEK, closedDays: ['2026-11-12'] };
    expect(workingDayAfter(closed, at('11-11T08:30'), 6)).toBe('2026-11-20');
    expect(workingMinutes(closed, at('11-12T08:00'), at('11-12T16:00'))).toBe(0);
  });

  it('counts local hours on the days when the clock changes', () => {
    const chicago = {
      ...WEEK,
      timeZone: 'America/Chicago',
      hours: [{ weekday: 7, opens: 0, closes: 6 * 60 }],
    };
    // Sun 8 Mar 2026: 2 o'clock is left out, so midnight to six is five hours.
    expect(workingMinutes(chicago, new Date('2026-03-08T06:00:00Z'), new Date('2026-03-08T18:00:00Z'))).toBe(
      300,
    );
    expect(dayAt(new Date('2026-03-08T05:59:00Z'), 'America/Chicago')).toBe('2026-03-07');
  });

  it('says working time in days and hours', () => {
    expect(minutesOfDay(WEEK)).toBe(480);
    expect([40, 120, 480, 11 * 60].map((minutes) => sayWorkingTime(minutes, 480))).toEqual([
      '40 min',
      '2 h',
      '1 d',
      '1 d 3 h',
    ]);
  });
});
