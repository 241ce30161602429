import 'server-only';
import type { Tx } from '@/db/client';
import type { Calendar } from '@/lib/domain/calendar/calendar';

interface CalendarRow {
  shop_id: string;
  time_zone: string;
  hours: { weekday: number; opens: string; closes: string }[];
  closed: string[];
}

/** Calendars of the shops named, in one statement; only of one's own shop and its partners. */
export async function loadCalendars(tx: Tx, shopIds: readonly string[]): Promise<Map<string, Calendar>> {
  const { rows } = await tx.raw<{ rows: CalendarRow[] }>(
    `select s.id as shop_id, s.time_zone,
       coalesce((select json_agg(json_build_object('weekday', h.weekday, 'opens', h.opens, 'closes', h.closes) order by h.weekday, h.opens)
         from shop_hours h where h.shop_id = s.id), '[]') as hours,
       coalesce((select json_agg(c.day) from shop_closed_days c where c.shop_id = s.id), '[]') as closed
     from shops s where s.id = any (?)`,
    [[...shopIds]],
  );
  return new Map(rows.map((row) => [row.shop_id, toCalendar(row)]));
}

function toCalendar(row: CalendarRow): Calendar {
  return {
    timeZone: row.time_zone,
    hours: row.hours.map(({ weekday, opens, closes }) => ({
      weekday,
      opens: minute(opens),
      closes: minute(closes),
    })),
    closedDays: row.closed,
  };
}

function minute(time: string): number {
  const [hours = 0, minutes = 0] = time.split(':').map(Number);
  return hours * 60 + minutes;
}
