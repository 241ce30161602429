import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { begin, closeDatabase, database } from '@/db/client';
import { loadBench } from '@/db/read-models/bench';
import { loadFeed } from '@/db/read-models/feed';
import { loadOrder } from '@/db/read-models/order-page';
import { loadWorkOrders } from '@/db/read-models/work-orders';
import { sendNotice } from '@/lib/jobs/send-notice';
import { expireQuote } from '@/lib/jobs/expire-quote';
import { holdPort } from '@/lib/cli/start/ports';
import { setClock } from '@/lib/adapters/clock';
import { workOrderFilterSchema } from '@/lib/schemas/work-orders';
import { writeMessage } from '@/lib/services/messages';
import { runOrderCommand } from '@/lib/services/order-commands';
import { type Mailbox, startMailbox } from '../../fake-services/mailbox';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft, makeClear, price } from '../support/orders';
import { buildPerson, buildShop } from '../support/shops';

const own = ownDatabase();
const read = <T>(sql: string, values: readonly unknown[] = []) =>
  readAsSuperuser<T>(own.superuserUrl(), sql, values);
const ports = { smtpPort: 0, pagePort: 0 };
let mailbox: Mailbox;

beforeAll(async () => {
  const [smtp, page] = [await holdPort(2700), await holdPort(8700)];
  Object.assign(ports, { smtpPort: smtp.port, pagePort: page.port });
  await Promise.all([smtp.release(), page.release()]);
  process.env['SMTP_URL'] = `smtp://127.0.0.1:${ports.smtpPort}`;
  mailbox = await startMailbox(ports);
});
afterAll(() => mailbox.close());

const waiting = (orderId: string, kind: string) =>
  read<{ id: string; state: string }>('select id, state from notices where order_id = $1 and kind = $2', [
    orderId,
    kind,
  ]);

describe('mail through the outbox', () => {
  it('is queued with the order and not without it', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const notices = await waiting(order.id, 'order.send');
    expect(notices).toHaveLength(1);
    const jobs = await read<{ task: string }>(
      `select t.identifier as task from graphile_worker._private_jobs j join graphile_worker._private_tasks t on t.id = j.task_id where j.payload ->> 'noticeId' = $1`,
      [notices[0]?.id],
    );
    expect(jobs).toEqual([{ task: 'send_notice' }]);
    await expect(order.act('sender', { do: 'send' })).rejects.toMatchObject({ code: 'conflict' });
    expect(await waiting(order.id, 'order.send')).toHaveLength(1);
  });

  it('goes to those whose step it became and whose role allows it, opens the order, and is sent once', async () => {
    const order = await buildDraft();
    const counter = await buildPerson(order.partner, ['counter']);
    await buildPerson(order.partner, ['bench']);
    await order.act('sender', { do: 'send' });
    for (const { id } of await waiting(order.id, 'order.send')) {
      await sendNotice(id);
      await sendNotice(id);
    }
    const mails = mailbox.mails.filter((mail) => mail.text.includes(order.id));
    expect(mails.map(({ to }) => to[0]).toSorted()).toEqual(
      [counter.email, order.partner.ownerEmail].toSorted(),
    );
    expect(mails[0]?.subject).toMatch(/Name a price$/);
    expect(mails[0]?.html).toContain(`/orders/${order.id}`);
  });

  it('is not sent when the step is gone', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    await order.act('partner', price(order.lineIds));
    const [notice] = await waiting(order.id, 'order.send');
    await sendNotice(notice?.id ?? '');
    expect((await waiting(order.id, 'order.send'))[0]?.state).toBe('dropped');
  });

  it('waits while the mail server is away, and goes out when it is back', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const [notice] = await waiting(order.id, 'order.send');
    await mailbox.close();
    await expect(sendNotice(notice?.id ?? '')).rejects.toThrow();
    expect((await waiting(order.id, 'order.send'))[0]?.state).toBe('waiting');
    mailbox = await startMailbox(ports);
    await sendNotice(notice?.id ?? '');
    expect((await waiting(order.id, 'order.send'))[0]?.state).toBe('sent');
  });
});

describe('a price that runs out', () => {
  it('is let run out by a task on the day after its last, and not before', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    await order.act('partner', {
      ...(price(order.lineIds) as Extract<ReturnType<typeof price>, { do: 'quote' }>),
      validUntil: '2099-12-01',
    });
    const ref = { orderId: order.id, revision: 1, shopId: order.partner.shopId };
    await expireQuote(ref);
    expect(await read('select 1 from quote_answers where order_id = $1', [order.id])).toEqual([]);
    setClock(new Date('2099-12-02T08:00:00Z'));
    await expireQuote(ref);
    setClock();
    expect(await read('select answer from quote_answers where order_id = $1', [order.id])).toEqual([
      { answer: 'expired' },
    ]);
    await expect(order.act('sender', { do: 'agree', revision: 1 })).rejects.toMatchObject({
      code: 'invalid',
    });
  });
});

describe('messages and the feed', () => {
  it('keep a message once, however often it is sent, and never make a form stale', async () => {
    const order = await buildDraft();
    const sent = await order.act('sender', { do: 'send' });
    const message = { id: randomUUID(), kind: 'message' as const, body: 'Bring it on Monday.' };
    await writeMessage(order.partner.owner, order.id, message);
    await writeMessage(order.partner.owner, order.id, message);
    expect(await read('select 1 from messages where order_id = $1', [order.id])).toHaveLength(1);
    const command = { ...price(order.lineIds) };
    await runOrderCommand(order.partner.owner, {
      orderId: order.id,
      expectedVersion: sent.version,
      requestKey: randomUUID(),
      command,
    });
  });

  it('give a shop its news from any number on, in order, without holes, and nobody else’s', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const messages = Array.from({ length: 12 }, (_message, index) => ({
      id: randomUUID(),
      kind: 'message' as const,
      body: `no. ${index}`,
    }));
    await Promise.all(
      messages.map((message, index) =>
        writeMessage(index % 2 ? order.sender.owner : order.partner.owner, order.id, message),
      ),
    );
    const news = await begin(order.partner.owner, (tx, actor) => loadFeed(tx, actor, 0));
    expect(news.rows.map(({ seq }) => seq)).toEqual(Array.from({ length: 13 }, (_seq, index) => index + 1));
    const later = await begin(order.partner.owner, (tx, actor) => loadFeed(tx, actor, 7));
    expect(later.rows.map(({ seq }) => seq)).toEqual([8, 9, 10, 11, 12, 13]);
    const stranger = await buildShop('Strangers');
    expect(await begin(stranger.owner, (tx, actor) => loadFeed(tx, actor, 0))).toEqual({ rows: [], last: 0 });
  });
});

describe('statements', () => {
  it('are few and do not grow: at most six a page, twelve a command', async () => {
    const order = await buildDraft();
    await makeClear(order);
    const count = async (work: () => Promise<unknown>) => {
      const seen: string[] = [];
      const note = ({ sql }: { sql: string }) => {
        if (!/^(BEGIN|COMMIT|ROLLBACK)/i.test(sql)) seen.push(sql);
      };
      database().on('query', note);
      await work();
      database().off('query', note);
      return seen.length;
    };
    const { owner } = order.sender;
    const shell = 1;
    const filter = workOrderFilterSchema.parse({ show: 'all', find: 'marrick' });
    expect(shell + (await count(() => begin(owner, loadBench)))).toBeLessThanOrEqual(6);
    expect(
      shell + (await count(() => begin(owner, (tx, actor) => loadWorkOrders(tx, actor, filter)))),
    ).toBeLessThanOrEqual(6);
    expect(
      shell + (await count(() => begin(owner, (tx, actor) => loadOrder(tx, actor, order.id)))),
    ).toBeLessThanOrEqual(6);
    expect(
      await count(() => order.act('partner', { do: 'start', lineId: order.lineIds[1] ?? '' })),
    ).toBeLessThanOrEqual(12);
  });
});

describe('the database away', () => {
  it('is said plainly, changes nothing, and is over without a restart', async () => {
    const order = await buildDraft();
    await order.act('sender', { do: 'send' });
    const admin = new pg.Client({ connectionString: inject('clusterUrl') });
    await admin.connect();
    const name = new URL(own.superuserUrl()).pathname.slice(1);
    await admin.query(`alter database ${name} with allow_connections false`);
    await admin.query(`select pg_terminate_backend(pid) from pg_stat_activity where datname = $1`, [name]);
    await expect(order.act('partner', price(order.lineIds))).rejects.toMatchObject({ code: 'unavailable' });
    await admin.query(`alter database ${name} with allow_connections true`);
    await admin.end();
    await order.act('partner', price(order.lineIds));
    await closeDatabase();
    expect(await read('select revision from quotes where order_id = $1', [order.id])).toEqual([
      { revision: 1 },
    ]);
  });
});
