import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { holdPort } from '@/lib/cli/start/ports';
import { keepFile, openFile } from '@/lib/services/files';
import { writeMessage } from '@/lib/services/messages';
import { type ObjectStore, startObjectStore } from '../../fake-services/object-store';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildDraft, type TestOrder } from '../support/orders';
import { buildShop } from '../support/shops';

const own = ownDatabase();
const folder = mkdtempSync(path.join(tmpdir(), 'wiretag-files-'));
let store: ObjectStore;
let port = 0;
let order: TestOrder;

const open = () =>
  startObjectStore({ port, folder, accessKeyId: 'key', secretAccessKey: 'secret', buckets: ['wiretag'] });

beforeAll(async () => {
  const held = await holdPort(9700);
  port = held.port;
  await held.release();
  process.env['S3_ENDPOINT'] = `http://127.0.0.1:${port}`;
  store = await open();
  order = await buildDraft();
  await order.act('sender', { do: 'send' });
});
afterAll(async () => {
  await store.close();
  rmSync(folder, { recursive: true, force: true });
});

async function photo(): Promise<Buffer> {
  const plain = sharp({ create: { width: 640, height: 480, channels: 3, background: '#886622' } });
  return plain
    .withExif({ IFD0: { Copyright: 'where-it-was-taken' } })
    .jpeg()
    .toBuffer();
}

describe('photos and papers of an order', () => {
  it('are made anew: nothing that the camera wrote goes along', async () => {
    const raw = await photo();
    expect(raw.includes('where-it-was-taken')).toBe(true);
    const { id } = await keepFile(order.sender.owner, order.id, { name: 'rod 4.jpg', bytes: raw });
    for (const name of readdirSync(path.join(folder, 'wiretag')).filter((one) => one.endsWith('.bytes'))) {
      expect(readFileSync(path.join(folder, 'wiretag', name)).includes('where-it-was-taken')).toBe(false);
    }
    const answer = await fetch(await openFile(order.partner.owner, id, false));
    expect(answer.headers.get('content-type')).toBe('image/jpeg');
    expect(answer.headers.get('content-disposition')).toContain("filename*=UTF-8''rod%204.jpg");
    expect((await sharp(Buffer.from(await answer.arrayBuffer())).metadata()).width).toBe(640);
    const small = await fetch(await openFile(order.partner.owner, id, true));
    expect((await sharp(Buffer.from(await small.arrayBuffer())).metadata()).width).toBe(320);
  });

  it('open for the two shops of the order and for nobody else', async () => {
    const { id } = await keepFile(order.partner.owner, order.id, { name: 'a.jpg', bytes: await photo() });
    const stranger = await buildShop('Strangers');
    await expect(openFile(stranger.owner, id, false)).rejects.toMatchObject({ code: 'not_found' });
    await expect(
      keepFile(stranger.owner, order.id, { name: 'a.jpg', bytes: await photo() }),
    ).rejects.toMatchObject({ code: 'not_found' });
    expect(await openFile(order.sender.owner, id, false)).toContain('X-Amz-Expires=60');
  });

  it.each([
    ['a page with a script', Buffer.from('<html><script>alert(1)</script></html>')],
    [
      'a drawing with a script',
      Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>'),
    ],
    ['a program', Buffer.from('MZ\u0000\u0000')],
    ['a picture in name only', Buffer.concat([Buffer.from([0xff, 0xd8, 0xff]), Buffer.from('<script>')])],
    ['nothing', Buffer.alloc(0)],
  ])('are refused when they are %s', async (_words, bytes) => {
    const before = readdirSync(path.join(folder, 'wiretag')).length;
    await expect(keepFile(order.sender.owner, order.id, { name: 'x.jpg', bytes })).rejects.toMatchObject({
      code: 'invalid',
    });
    expect(readdirSync(path.join(folder, 'wiretag'))).toHaveLength(before);
  });

  it('are refused when they would open to more than fifty million points', async () => {
    const bomb = await sharp({
      create: { width: 9000, height: 9000, channels: 3, background: '#fff' },
      limitInputPixels: false,
    })
      .png()
      .toBuffer();
    await expect(
      keepFile(order.sender.owner, order.id, { name: 'x.png', bytes: bomb }),
    ).rejects.toMatchObject({ code: 'invalid' });
  });

  it('hang on the message they were sent with', async () => {
    const { id } = await keepFile(order.sender.owner, order.id, { name: 'a.jpg', bytes: await photo() });
    const messageId = '0190a0a0-0000-7000-8000-000000000001';
    await writeMessage(order.sender.owner, order.id, {
      id: messageId,
      kind: 'message',
      body: 'see this',
      files: [id],
    });
    const rows = await readAsSuperuser(
      own.superuserUrl(),
      'select 1 from attachments where id = $1 and message_id = $2',
      [id, messageId],
    );
    expect(rows).toHaveLength(1);
  });

  it('say so when the store is away, leave nothing half done, and go on when it is back', async () => {
    await store.close();
    const count = async () => readAsSuperuser(own.superuserUrl(), 'select 1 from attachments');
    const before = (await count()).length;
    await expect(
      keepFile(order.sender.owner, order.id, { name: 'a.jpg', bytes: await photo() }),
    ).rejects.toMatchObject({ code: 'unavailable' });
    expect(await count()).toHaveLength(before);
    store = await open();
    await keepFile(order.sender.owner, order.id, { name: 'a.jpg', bytes: await photo() });
    expect(await count()).toHaveLength(before + 1);
  });
});
