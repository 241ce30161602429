import 'server-only';
import { GetObjectCommand, S3Client } from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import type { Readable } from 'node:stream';
import { settings } from '@/lib/config/env';
import { AppError } from '@/lib/errors';

let client: S3Client | undefined;

function store(): S3Client {
  const { S3_ENDPOINT, S3_REGION, S3_ACCESS_KEY_ID, S3_SECRET_ACCESS_KEY } = settings();
  client ??= new S3Client({
    ...{ endpoint: S3_ENDPOINT, region: S3_REGION, forcePathStyle: true, maxAttempts: 2 },
    credentials: { accessKeyId: S3_ACCESS_KEY_ID, secretAccessKey: S3_SECRET_ACCESS_KEY },
    requestChecksumCalculation: 'WHEN_REQUIRED',
  });
  return client;
}

/** Stores bytes under a key. @throws AppError unavailable when the file store does not answer. */
export async function storeFile(key: string, body: Readable | Buffer, type: string): Promise<void> {
  try {
    await new Upload({
      client: store(),
      params: { Bucket: settings().S3_BUCKET, Key: key, Body: body, ContentType: type },
    }).done();
  } catch (error) {
    if (error instanceof AppError) throw error;
    throw new AppError(
      'unavailable',
      'The file store cannot be reached at the moment. Nothing was kept. Try again.',
    );
  }
}

/** A link that opens one file for a minute, under its own name. */
export async function signFileLink(key: string, name: string, type: string): Promise<string> {
  const plain = name.replaceAll(/[^\x20-\x7e]|["\\]/g, '_');
  const command = new GetObjectCommand({
    ...{ Bucket: settings().S3_BUCKET, Key: key, ResponseContentType: type },
    ResponseContentDisposition: `inline; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(name)}`,
    ResponseCacheControl: 'private, max-age=60',
  });
  return getSignedUrl(store(), command, { expiresIn: 60 });
}
