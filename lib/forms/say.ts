const DAY = new Intl.DateTimeFormat('en-GB', {
  weekday: 'short',
  day: 'numeric',
  month: 'short',
  timeZone: 'UTC',
});

/** A day as Fri 11 Dec, with the year when it is not the one given. */
export function sayDay(day: string, thisYear: number): string {
  const [year = 0] = day.split('-').map(Number);
  const words = DAY.format(new Date(`${day}T00:00:00Z`)).replace(',', '');
  return year === thisYear ? words : `${words} ${year}`;
}

/** A moment as Tue 8 Dec 10:05 in a shop's zone. */
export function sayMoment(at: Date | string, timeZone: string): string {
  const moment = typeof at === 'string' ? new Date(at) : at;
  return new Intl.DateTimeFormat('en-GB', {
    weekday: 'short',
    day: 'numeric',
    month: 'short',
    hour: '2-digit',
    minute: '2-digit',
    timeZone,
  })
    .format(moment)
    .replaceAll(',', '');
}
