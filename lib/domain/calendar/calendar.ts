import { TZDate } from '@date-fns/tz';

/** When a shop works. Times are local to its zone. */
export interface Calendar {
  readonly timeZone: string;
  /** Opening spans by ISO weekday, 1 is Monday; minutes of the local day. */
  readonly hours: readonly { readonly weekday: number; readonly opens: number; readonly closes: number }[];
  /** Days on which it is closed, as 2026-12-25. */
  readonly closedDays: readonly string[];
}

/** The local day of an instant, as 2026-12-01. */
export function dayAt(instant: Date, timeZone: string): string {
  const local = new TZDate(instant.getTime(), timeZone);
  return isoDay(local.getFullYear(), local.getMonth() + 1, local.getDate());
}

/** The day after, as 2026-12-02. */
export function nextDay(day: string): string {
  return shiftDay(day, 1);
}

/** A day moved by whole days of the calendar, not of work. */
export function shiftDay(day: string, by: number): string {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number);
  return new Date(Date.UTC(year, month - 1, date + by)).toISOString().slice(0, 10);
}

/** ISO weekday of a day, 1 is Monday. */
export function weekdayOf(day: string): number {
  return new Date(`${day}T00:00:00Z`).getUTCDay() || 7;
}

/** Whether the shop works on a day at all. */
export function isWorkingDay(calendar: Calendar, day: string): boolean {
  return !calendar.closedDays.includes(day) && calendar.hours.some((span) => span.weekday === weekdayOf(day));
}

/** The day that lies `count` working days after the local day of `from`. A shop without hours counts every day. */
export function workingDayAfter(calendar: Calendar, from: Date, count: number): string {
  let day = dayAt(from, calendar.timeZone);
  const counts = (one: string) => calendar.hours.length === 0 || isWorkingDay(calendar, one);
  for (let left = count; left > 0;) {
    day = nextDay(day);
    if (counts(day)) left -= 1;
  }
  return day;
}

/** Working minutes of the shop between two instants; whole minutes, none when `to` is before `from`. */
export function workingMinutes(calendar: Calendar, from: Date, to: Date): number {
  if (to <= from) return 0;
  let minutes = 0;
  const last = dayAt(to, calendar.timeZone);
  for (let day = dayAt(from, calendar.timeZone); day <= last; day = nextDay(day)) {
    if (!isWorkingDay(calendar, day)) continue;
    for (const span of calendar.hours.filter((one) => one.weekday === weekdayOf(day))) {
      const opens = Math.max(from.getTime(), instantOf(calendar, day, span.opens));
      const closes = Math.min(to.getTime(), instantOf(calendar, day, span.closes));
      minutes += Math.max(0, closes - opens);
    }
  }
  return Math.floor(minutes / 60_000);
}

/** The usual length of a working day, in minutes: the longest of the week, 480 where there are no hours. */
export function minutesOfDay(calendar: Calendar): number {
  const byDay = [1, 2, 3, 4, 5, 6, 7].map((weekday) =>
    calendar.hours
      .filter((span) => span.weekday === weekday)
      .reduce((all, span) => all + span.closes - span.opens, 0),
  );
  return Math.max(...byDay) || 480;
}

/** Working time in words: `5 d 3 h`, `2 h`, `40 min`. */
export function sayWorkingTime(minutes: number, dayLength: number): string {
  if (minutes < 60) return `${minutes} min`;
  const days = Math.floor(minutes / dayLength);
  const hours = Math.floor((minutes - days * dayLength) / 60);
  if (days === 0) return `${hours} h`;
  return hours === 0 ? `${days} d` : `${days} d ${hours} h`;
}

function instantOf(calendar: Calendar, day: string, minute: number): number {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number);
  return new TZDate(
    year,
    month - 1,
    date,
    Math.floor(minute / 60),
    minute % 60,
    0,
    0,
    calendar.timeZone,
  ).getTime();
}

function isoDay(year: number, month: number, date: number): string {
  return `${year}-${String(month).padStart(2, '0')}-${String(date).padStart(2, '0')}`;
}
