import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { Length } from '@/lib/domain/quantity/length';
import { parseLength } from '@/lib/domain/quantity/parse-length';
import { changeShop } from '@/lib/services/shop-settings';
import { ownDatabase } from '../support/database';
import { buildDraft, handOver, price, rodSizes } from '../support/orders';
import { buildPartner, buildShop } from '../support/shops';

ownDatabase();

function millimetres(text: string): Length {
  const parsed = parseLength(text, 'mm');
  if (!parsed.ok) throw new Error(text);
  return parsed.value;
}

describe('an inch shop and a millimetre shop', () => {
  it('repeat back in millimetres against the figures released in millimetres, exactly', async () => {
    const sender = await buildShop('Inches');
    const partner = await buildPartner(sender, 'Millimetres');
    await changeShop(partner.owner, 1, {
      name: 'Millimetres',
      unit: 'mm',
      timeZone: 'UTC',
      hours: [],
    });
    const order = await buildDraft(['grind_rods'], { sender, partner });
    const rods = order.lineIds[0] ?? '';
    await order.act('sender', { do: 'send' });
    await order.act('partner', price(order.lineIds));
    await order.act('sender', { do: 'agree', revision: 1 });
    await order.act('sender', handOver('sent', order.partId));
    await order.act('partner', handOver('checked_in', order.partId));
    await order.act('sender', { do: 'release', lines: [rodSizes(rods, '2.1151', '2.1146')], reason: '' });
    const key = (lower: string, upper: string) =>
      order.act('partner', {
        do: 'repeat_back',
        rev: 1,
        sizes: [
          {
            id: randomUUID(),
            lineId: rods,
            what: 'Rods',
            lower: millimetres(lower),
            upper: millimetres(upper),
            lowerText: lower,
            upperText: upper,
            unit: 'mm',
          },
        ],
      });
    // The nearest .001 mm to the upper limit is 53.724: past it, and so refused.
    expect((await key('53.711', '53.724')).matches).toBe(false);
    expect((await key('53.711', '53.723')).matches).toBe(true);
  });
});
