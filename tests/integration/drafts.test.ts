import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { begin } from '@/db/client';
import { loadPartsToSend } from '@/db/read-models/builds';
import { loadOrder } from '@/db/read-models/order-page';
import { holdPort } from '@/lib/cli/start/ports';
import { sendNotice } from '@/lib/jobs/send-notice';
import type { DraftInput } from '@/lib/schemas/order-draft';
import { createBuild } from '@/lib/services/builds';
import { addPart } from '@/lib/services/builds';
import { acceptInvitation, namePartner } from '@/lib/services/invitations';
import { runOrderCommand } from '@/lib/services/order-commands';
import { keepDraft, setReference } from '@/lib/services/order-drafts';
import { keepWorksheet } from '@/lib/services/worksheets';
import { findPreset } from '@/lib/domain/builds/presets';
import { type Mailbox, startMailbox } from '../../fake-services/mailbox';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildPartner, buildPerson, buildShop, PASSWORD, type TestShop, ticketOf } from '../support/shops';

const own = ownDatabase();
const read = <T>(sql: string, values: readonly unknown[] = []) =>
  readAsSuperuser<T>(own.superuserUrl(), sql, values);
let mailbox: Mailbox;
let shop: TestShop;
let partner: TestShop;
let crank: string;
let block: string;

const EMPTY: DraftInput = {
  ...{ partnerShopId: null, partIds: [], operations: [], neededBackOn: null, transport: 'delivered' },
  ...{ acceptRule: 'own_check', notes: '', standingInstruction: '', reference: '' },
};

beforeAll(async () => {
  const [smtp, page] = [await holdPort(2720), await holdPort(8720)];
  await Promise.all([smtp.release(), page.release()]);
  process.env['SMTP_URL'] = `smtp://127.0.0.1:${smtp.port}`;
  mailbox = await startMailbox({ smtpPort: smtp.port, pagePort: page.port });
  shop = await buildShop();
  partner = await buildPartner(shop);
  const preset = findPreset('inline6');
  if (!preset) throw new Error('No inline six');
  const build = { engine: 'Marrick 215 six', preset, customerName: null, notes: '', neededOn: null };
  const { id: buildId } = await createBuild(shop.owner, randomUUID(), build);
  const part = { buildId, makerNo: '', stamps: [], pieces: 1, condition: '' };
  crank = (await addPart(shop.owner, randomUUID(), { ...part, kind: 'crankshaft' })).id;
  block = (await addPart(shop.owner, randomUUID(), { ...part, kind: 'block' })).id;
});
afterAll(() => mailbox.close());

const linesOf = (id: string) =>
  read<{ id: string; operation: string; position: number }>(
    'select id, operation, position from order_lines where order_id = $1 order by position',
    [id],
  );

describe('a draft', () => {
  it('is kept as it stands while one types, however little that is', async () => {
    const id = randomUUID();
    expect(await keepDraft(shop.owner, { id, version: 0 }, EMPTY)).toEqual({ id, version: 1 });
    const input = { ...EMPTY, notes: 'the crank with the long snout', partIds: [crank] };
    expect(await keepDraft(shop.owner, { id, version: 1 }, input)).toEqual({ id, version: 2 });
    const [order] = await read<{ notes: string; title: string }>('select * from orders where id = $1', [id]);
    expect(order).toMatchObject({ notes: 'the crank with the long snout', title: 'Crankshaft' });
    expect(await read('select 1 from order_parts where order_id = $1', [id])).toHaveLength(1);
  });

  it('puts its operations into the order of work and keeps the sheets of those that stay', async () => {
    const id = randomUUID();
    const asked = { ...EMPTY, partIds: [crank], operations: ['polish', 'grind_rods'] };
    await keepDraft(shop.owner, { id, version: 0 }, asked);
    expect((await linesOf(id)).map(({ operation }) => operation)).toEqual(['grind_rods', 'polish']);
    const [grind] = await linesOf(id);
    const sheets = () =>
      read<{ id: string; raw: object }>('select id, raw from worksheets where line_id = $1', [grind?.id]);
    const [sheet] = await sheets();
    await keepWorksheet(shop.owner, sheet?.id ?? '', 1, { note: 'typed already' });
    const operations = ['grind_rods', 'grind_mains', 'crack_test'];
    await keepDraft(shop.owner, { id, version: 1 }, { ...asked, partIds: [crank, block], operations });
    expect((await linesOf(id)).map(({ operation, position }) => [operation, position])).toEqual([
      ['crack_test', 1],
      ['grind_rods', 2],
      ['grind_mains', 3],
    ]);
    expect(await sheets()).toEqual([{ id: sheet?.id, raw: { note: 'typed already' } }]);
    const links = await read<{ kind: string }>(
      `select p.kind from order_line_parts l join parts p on p.id = l.part_id where l.line_id = $1`,
      [grind?.id],
    );
    expect(links).toEqual([{ kind: 'crankshaft' }]);
  });

  it('offers its own parts wherever they are, beside the newest at home, and none of other shops', async () => {
    const id = randomUUID();
    await keepDraft(shop.owner, { id, version: 0 }, { ...EMPTY, partIds: [crank] });
    // Many newer parts at home must not push the draft's own part off its list.
    await read(
      `insert into parts (id, shop_id, kind, pieces, created_at)
       select gen_random_uuid(), $1, 'other part', 1, now() + interval '1 hour' from generate_series(1, 320)`,
      [shop.shopId],
    );
    const offered = await begin(shop.owner, (tx, actor) => loadPartsToSend(tx, actor, id));
    expect(offered.chosen).toEqual([crank]);
    expect(offered.parts).toHaveLength(301);
    const fresh = await begin(shop.owner, (tx, actor) => loadPartsToSend(tx, actor, null));
    expect(fresh.parts).toHaveLength(300);
    expect(await begin(partner.owner, (tx, actor) => loadPartsToSend(tx, actor, id))).toEqual({
      parts: [],
      chosen: [],
    });
  });

  it('is not overwritten by a screen that has not seen its latest change', async () => {
    const id = randomUUID();
    await keepDraft(shop.owner, { id, version: 0 }, EMPTY);
    await keepDraft(shop.owner, { id, version: 1 }, { ...EMPTY, notes: 'first' });
    for (const version of [0, 1])
      await expect(
        keepDraft(shop.owner, { id, version }, { ...EMPTY, notes: 'second' }),
      ).rejects.toMatchObject({ code: 'stale' });
    expect(await read('select notes from orders where id = $1', [id])).toEqual([{ notes: 'first' }]);
  });

  it('is nobody else’s, and no draft any more once it is sent', async () => {
    const id = randomUUID();
    const input = { ...EMPTY, partnerShopId: partner.shopId, partIds: [crank], operations: ['polish'] };
    await keepDraft(shop.owner, { id, version: 0 }, input);
    const stranger = await buildShop('Strangers');
    for (const ticket of [partner.owner, stranger.owner])
      await expect(keepDraft(ticket, { id, version: 1 }, EMPTY)).rejects.toMatchObject({ code: 'not_found' });
    const command = { do: 'send' as const };
    await runOrderCommand(shop.owner, { orderId: id, expectedVersion: 1, requestKey: randomUUID(), command });
    await expect(keepDraft(shop.owner, { id, version: 2 }, EMPTY)).rejects.toMatchObject({
      code: 'not_found',
    });
  });

  it('takes no part of another shop', async () => {
    const stranger = await buildShop('Strangers');
    await expect(
      keepDraft(stranger.owner, { id: randomUUID(), version: 0 }, { ...EMPTY, partIds: [crank] }),
    ).rejects.toMatchObject({ code: 'invalid', fields: { partIds: ['Choose the parts again.'] } });
  });
});

describe('a reference', () => {
  it('is each side’s own, and never the other’s', async () => {
    const id = randomUUID();
    const input = { ...EMPTY, partnerShopId: partner.shopId, partIds: [crank], operations: ['polish'] };
    await keepDraft(shop.owner, { id, version: 0 }, { ...input, reference: 'PO 7' });
    await expect(setReference(partner.owner, id, 'job 12')).rejects.toMatchObject({ code: 'not_found' });
    const command = { do: 'send' as const };
    await runOrderCommand(shop.owner, { orderId: id, expectedVersion: 1, requestKey: randomUUID(), command });
    await setReference(partner.owner, id, 'job 12');
    const reference = (ticket: { tokenHash: string }) =>
      begin(ticket, async (tx, actor) => (await loadOrder(tx, actor, id))?.reference);
    expect(await reference(shop.owner)).toBe('PO 7');
    expect(await reference(partner.owner)).toBe('job 12');
  });
});

describe('an order to a machine shop that is not here yet', () => {
  it('carries the invitation: one e-mail with both, which opens the order', async () => {
    const email = `new-${randomUUID().slice(0, 8)}@shop.example`;
    const { shopId } = await namePartner(shop.owner, randomUUID(), { shopName: 'New Grinding', email });
    expect(await read('select 1 from notices where email_norm = $1', [email])).toEqual([]);
    const id = randomUUID();
    const input = { ...EMPTY, partnerShopId: shopId, partIds: [crank], operations: ['polish'] };
    await keepDraft(shop.owner, { id, version: 0 }, { ...input, neededBackOn: '2099-12-11' });
    const command = { do: 'send' as const };
    await runOrderCommand(shop.owner, { orderId: id, expectedVersion: 1, requestKey: randomUUID(), command });
    const notices = await read<{ id: string }>('select id from notices where email_norm = $1', [email]);
    expect(notices).toHaveLength(1);
    await sendNotice(notices[0]?.id ?? '');
    const [mail, ...more] = mailbox.mails.filter(({ to }) => to.includes(email));
    expect(more).toEqual([]);
    expect(mail?.subject).toMatch(/^WO \d+ from Test Engines$/);
    expect(mail?.text).toContain('Needed back Fri 11 Dec 2099.');
    const link = /\/invitation\/([^?\s]+)\?order=(\S+)/.exec(mail?.text ?? '');
    expect(link?.[2]).toBe(id);
    await acceptInvitation(link?.[1] ?? '', { name: 'New owner', password: PASSWORD, signedInId: null });
    const command2 = { do: 'decline' as const, reason: 'no room' };
    await runOrderCommand(await ticketOf(email), {
      ...{ orderId: id, expectedVersion: 2, requestKey: randomUUID(), command: command2 },
    });
    expect(await read('select status from orders where id = $1', [id])).toEqual([{ status: 'declined' }]);
  });

  it('is named by those only who may bring partners in', async () => {
    const bench = await buildPerson(shop, ['bench']);
    await expect(
      namePartner(bench, randomUUID(), { shopName: 'X', email: 'x@shop.example' }),
    ).rejects.toMatchObject({ code: 'forbidden' });
  });
});
