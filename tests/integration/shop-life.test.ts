import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { begin } from '@/db/client';
import { loadCalendars } from '@/db/read-models/calendars';
import { loadPartners } from '@/db/read-models/partners';
import { houseText } from '@/lib/domain/operations/house';
import { loadShop } from '@/db/read-models/shop';
import { setClock } from '@/lib/adapters/clock';
import { workingMinutes } from '@/lib/domain/calendar/calendar';
import { changePartnership, notePartner, remindPartner } from '@/lib/services/partners';
import { invitePartner } from '@/lib/services/invitations';
import { seeThread, writeMessage } from '@/lib/services/messages';
import { changeHouse, changeShop, setClosedDay } from '@/lib/services/shop-settings';
import { closedDaySchema, houseSchema, hoursSchema } from '@/lib/schemas/shop-settings';
import { loadBench } from '@/db/read-models/bench';
import { loadOrder } from '@/db/read-models/order-page';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft, price } from '../support/orders';
import { buildPerson, buildShop } from '../support/shops';

const own = ownDatabase();

describe('a shop’s hours and closed days', () => {
  it('are counted by waiting and promises: two spans a day, and days on which nobody works', async () => {
    const order = await buildDraft();
    const { partner } = order;
    const spans = [
      { opens: '07:00', closes: '12:00' },
      { opens: '13:00', closes: '16:00' },
    ];
    const week = [...Array.from({ length: 5 }, () => spans), [], []];
    await changeShop(partner.owner, 1, { name: 'Test Grinding', unit: 'in', timeZone: 'UTC', hours: week });
    await setClosedDay(partner.owner, '2026-12-25', { note: 'Christmas' });
    const calendar = await begin(order.sender.owner, async (tx) =>
      (await loadCalendars(tx, [partner.shopId])).get(partner.shopId),
    );
    if (!calendar) throw new Error('No calendar');
    // Thursday 24 December 15:00 to Monday 28 December 08:00: one hour, the holiday and the weekend, one hour.
    const minutes = workingMinutes(calendar, new Date('2026-12-24T15:00Z'), new Date('2026-12-28T08:00Z'));
    expect(minutes).toBe(120);
    setClock(new Date('2026-12-24T09:00:00Z'));
    await order.act('sender', { do: 'send' });
    await order.act('partner', { ...price(order.lineIds), promiseDays: 1 } as never);
    setClock();
    await setClosedDay(partner.owner, '2026-12-25', null);
    const shop = await begin(partner.owner, (tx, actor) => loadShop(tx, actor, ''));
    expect(shop.closedDays).toEqual([]);
    expect(shop.hours).toHaveLength(10);
  });

  it('are read as they are typed, or refused beside the field', () => {
    expect(hoursSchema.parse('8:00-12:00, 13.00 – 17.00')).toEqual([
      { opens: '08:00', closes: '12:00' },
      { opens: '13:00', closes: '17:00' },
    ]);
    expect(hoursSchema.parse('')).toEqual([]);
    const words = (text: string) => hoursSchema.safeParse(text).error?.issues[0]?.message;
    expect(words('eight to four')).toMatch(/Write the hours as/);
    expect(words('17:00-8:00')).toBe('It closes before it opens.');
    expect(words('8:00-12:00, 11:00-17:00')).toBe('These hours overlap.');
    expect(words('8:00-25:00')).toMatch(/Write the hours as/);
    expect(closedDaySchema.safeParse({ day: '2026-02-30', note: '' }).success).toBe(false);
  });
});

describe('house defaults', () => {
  it('are kept by an owner, as typed, in the shop’s unit; what is no size is refused beside its field', async () => {
    const shop = await buildShop('Millimetres', 'mm');
    const asked = { version: '1', unit: 'mm', 'house:hone.honeLimit': '0,01', 'house:bore.stock': '' };
    const { house } = houseSchema.parse(asked);
    await changeHouse(shop.owner, 1, house);
    const kept = await begin(shop.owner, (tx, actor) => loadShop(tx, actor, ''));
    expect(kept.house).toEqual(house);
    await expect(changeHouse(shop.owner, 1, house)).rejects.toMatchObject({ code: 'stale' });
    // A shop that goes over to inches still means the hundredth of a millimetre that it typed.
    const key = 'hone.honeLimit';
    expect(houseText(kept.house, key, 'mm')).toBe('0,01');
    expect(houseText(kept.house, key, 'in')).toBe('0,01 mm');
    const resaved = houseSchema.parse({ version: '2', unit: 'in', [`house:${key}`]: '0,01 mm' }).house;
    expect(houseText(resaved, key, 'mm')).toBe('0,01 mm');
    const bench = await buildPerson(shop, ['bench']);
    await expect(changeHouse(bench, 2, house)).rejects.toMatchObject({ code: 'forbidden' });
    const [name = ''] = Object.keys(house.typed);
    const wrong = houseSchema.safeParse({ ...asked, [`house:${name}`]: 'thick' });
    expect(wrong.error?.issues[0]?.path).toEqual([`house:${name}`]);
  });
});

describe('a partnership', () => {
  it('can be paused, taken up again and ended; what is under way goes on, nothing new is sent', async () => {
    const order = await buildDraft();
    const { sender, partner } = order;
    await changePartnership(partner.owner, sender.shopId, 2, 'paused');
    await expect(order.act('sender', { do: 'send' })).rejects.toMatchObject({ code: 'invalid' });
    await expect(changePartnership(sender.owner, partner.shopId, 2, 'active')).rejects.toMatchObject({
      code: 'stale',
    });
    await changePartnership(sender.owner, partner.shopId, 3, 'active');
    await order.act('sender', { do: 'send' });
    await changePartnership(sender.owner, partner.shopId, 4, 'ended');
    await order.act('partner', price(order.lineIds));
    const bench = await buildPerson(sender, ['bench']);
    await expect(changePartnership(bench, partner.shopId, 5, 'active')).rejects.toMatchObject({
      code: 'forbidden',
    });
  });

  it('has a note for each side that the other never sees', async () => {
    const { sender, partner } = await buildDraft();
    await notePartner(sender.owner, partner.shopId, 'Ring before ten.');
    const seen = async (shop: typeof sender) =>
      (await begin(shop.owner, loadPartners)).map(({ note }) => note);
    expect(await seen(sender)).toEqual(['Ring before ten.']);
    expect(await seen(partner)).toEqual(['']);
    const stranger = await buildShop('Strangers');
    await expect(notePartner(stranger.owner, partner.shopId, 'x')).rejects.toMatchObject({
      code: 'not_found',
    });
  });

  it('writes to a shop that has not come in once more, with a new link when the old one is too old', async () => {
    const shop = await buildShop();
    const email = `slow-${randomUUID().slice(0, 8)}@shop.example`;
    const invited = await invitePartner(shop.owner, randomUUID(), { shopName: 'Slow Grinding', email });
    await remindPartner(shop.owner, invited.shopId);
    const read = <T>(sql: string) => readAsSuperuser<T>(own.superuserUrl(), sql, [email]);
    const links = () =>
      read<{ id: string }>(`select detail ->> 'invitationId' as id from notices where email_norm = $1`);
    expect(new Set((await links()).map(({ id }) => id))).toEqual(new Set([invited.invitationId]));
    await read(`update invitations set until = now() where email_norm = $1`);
    await remindPartner(shop.owner, invited.shopId);
    expect(new Set((await links()).map(({ id }) => id)).size).toBe(2);
  });
});

describe('unread messages', () => {
  it('are counted for each person until they were in view, never one’s own, and never past the end', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const colleague = await buildPerson(order.partner, ['bench']);
    const write = (body: string) =>
      writeMessage(order.sender.owner, order.id, { id: randomUUID(), kind: 'message', body });
    await write('one');
    await write('two');
    const unread = async (ticket: { tokenHash: string }) =>
      (await begin(ticket, loadBench)).theirs.concat((await begin(ticket, loadBench)).yours)[0]?.unread;
    expect(await unread(order.sender.owner)).toBe(0);
    expect(await unread(order.partner.owner)).toBe(2);
    expect(await seeThread(order.partner.owner, order.id, 2)).toEqual({ seen: 2 });
    expect(await unread(order.partner.owner)).toBe(1);
    expect(await seeThread(order.partner.owner, order.id, 999)).toEqual({ seen: 3 });
    expect(await seeThread(order.partner.owner, order.id, 1)).toEqual({ seen: 3 });
    expect(await unread(order.partner.owner)).toBe(0);
    expect(await unread(colleague)).toBe(2);
    const view = await begin(order.partner.owner, (tx, actor) => loadOrder(tx, actor, order.id));
    expect(view?.seenSeq).toBe(3);
    const stranger = await buildShop('Strangers');
    await expect(seeThread(stranger.owner, order.id, 1)).rejects.toMatchObject({ code: 'not_found' });
  });
});
