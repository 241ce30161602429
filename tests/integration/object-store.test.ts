import {
  CopyObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Readable } from 'node:stream';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { holdPort } from '@/lib/cli/start/ports';
import { type ObjectStore, startObjectStore } from '../../fake-services/object-store';

const folder = mkdtempSync(path.join(tmpdir(), 'wiretag-store-'));
const Bucket = 'files';
let store: ObjectStore;
let endpoint = '';

const clientWith = (secretAccessKey: string) =>
  new S3Client({
    endpoint,
    region: 'us-east-1',
    forcePathStyle: true,
    maxAttempts: 1,
    credentials: { accessKeyId: 'k', secretAccessKey },
  });
let client: S3Client;

beforeAll(async () => {
  const held = await holdPort(9800);
  await held.release();
  endpoint = `http://127.0.0.1:${held.port}`;
  store = await startObjectStore({
    port: held.port,
    folder,
    accessKeyId: 'k',
    secretAccessKey: 's',
    buckets: [Bucket],
  });
  client = clientWith('s');
});
afterAll(async () => {
  client.destroy();
  await store.close();
  rmSync(folder, { recursive: true, force: true });
});

async function bytesOf(Key: string): Promise<Buffer> {
  const { Body } = await client.send(new GetObjectCommand({ Bucket, Key }));
  return Buffer.from((await Body?.transformToByteArray()) ?? []);
}

describe('the stand-in for file storage', () => {
  it('gives back exactly what was stored, also from a stream and in parts', async () => {
    const bytes = randomBytes(12 * 1024 * 1024);
    const slices = Array.from({ length: 192 }, (_slice, index) =>
      bytes.subarray(index * 65_536, (index + 1) * 65_536),
    );
    await new Upload({ client, params: { Bucket, Key: 'big', Body: Readable.from(slices) } }).done();
    expect((await bytesOf('big')).equals(bytes)).toBe(true);
  });

  it('refuses a body that is not what its sender said', async () => {
    const wrong = new PutObjectCommand({
      Bucket,
      Key: 'x',
      Body: 'hello',
      ContentMD5: Buffer.alloc(16).toString('base64'),
    });
    await expect(client.send(wrong)).rejects.toMatchObject({ name: 'BadDigest' });
  });

  it('refuses a wrong secret, an unsigned request, a changed link and one that is too old', async () => {
    await client.send(new PutObjectCommand({ Bucket, Key: 'secret', Body: 'hello' }));
    await expect(
      clientWith('other').send(new GetObjectCommand({ Bucket, Key: 'secret' })),
    ).rejects.toMatchObject({ name: 'SignatureDoesNotMatch' });
    expect((await fetch(`${endpoint}/${Bucket}/secret`)).status).toBe(403);
    const link = await getSignedUrl(client, new GetObjectCommand({ Bucket, Key: 'secret' }), {
      expiresIn: 60,
    });
    expect(await (await fetch(link)).text()).toBe('hello');
    expect((await fetch(link.replace('/secret', '/big'))).status).toBe(403);
    const old = await getSignedUrl(client, new GetObjectCommand({ Bucket, Key: 'secret' }), {
      expiresIn: 1,
      signingDate: new Date(Date.now() - 5000),
    });
    expect((await fetch(old)).status).toBe(403);
  });

  it('overwrites only when it may, copies, lists in pages and says what is not there', async () => {
    await client.send(new PutObjectCommand({ Bucket, Key: 'p/1', Body: 'one' }));
    await expect(
      client.send(new PutObjectCommand({ Bucket, Key: 'p/1', Body: 'two', IfNoneMatch: '*' })),
    ).rejects.toMatchObject({ name: 'PreconditionFailed' });
    await client.send(new CopyObjectCommand({ Bucket, Key: 'p/2', CopySource: `${Bucket}/p/1` }));
    const first = await client.send(new ListObjectsV2Command({ Bucket, Prefix: 'p/', MaxKeys: 1 }));
    expect(first.IsTruncated).toBe(true);
    const second = await client.send(
      new ListObjectsV2Command({ Bucket, Prefix: 'p/', ContinuationToken: first.NextContinuationToken }),
    );
    expect(second.Contents?.map(({ Key }) => Key)).toEqual(['p/2']);
    await expect(client.send(new HeadObjectCommand({ Bucket, Key: 'nope' }))).rejects.toMatchObject({
      name: 'NotFound',
    });
  });
});
