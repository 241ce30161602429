import 'server-only';
import formidable, { errors as formErrors } from 'formidable';
import type { IncomingMessage } from 'node:http';
import { PassThrough, Readable } from 'node:stream';
import type { ReadableStream as WebStream } from 'node:stream/web';
import { AppError } from '@/lib/errors';

/** The most that one file may hold. */
export const MOST_BYTES = 25 * 1024 * 1024;

/** One uploaded file with the fields sent beside it. */
export interface UploadedFile {
  readonly name: string;
  readonly bytes: Buffer;
  readonly fields: Readonly<Record<string, string>>;
}

/** Reads one file from a multipart form, as a stream with a limit. @throws AppError invalid for anything else. */
export async function readUpload(request: Request): Promise<UploadedFile> {
  if (!/^multipart\/form-data\b/i.test(request.headers.get('content-type') ?? '') || !request.body) {
    throw new AppError('invalid', 'Send one file as a form.');
  }
  const chunks: Buffer[] = [];
  const form = formidable({
    ...{
      maxFileSize: MOST_BYTES,
      maxTotalFileSize: MOST_BYTES,
      maxFiles: 1,
      maxFields: 5,
      maxFieldsSize: 10_000,
      allowEmptyFiles: false,
    },
    fileWriteStreamHandler: () => new PassThrough().on('data', (chunk: Buffer) => chunks.push(chunk)),
  });
  const incoming = Object.assign(Readable.fromWeb(request.body as WebStream<Uint8Array>), {
    headers: Object.fromEntries(request.headers.entries()),
    ...{ method: request.method, url: request.url },
  });
  try {
    const [fields, files] = await form.parse(incoming as unknown as IncomingMessage);
    const file = Object.values(files).flat()[0];
    if (!file) throw new AppError('invalid', 'Choose a file.');
    const words = Object.entries(fields).map(([name, values]) => [name, values?.[0] ?? ''] as const);
    return {
      name: file.originalFilename ?? 'file',
      bytes: Buffer.concat(chunks),
      fields: Object.fromEntries(words),
    };
  } catch (error) {
    if (error instanceof AppError) throw error;
    const isTooLarge = error instanceof formErrors.default && error.httpCode === 413;
    throw new AppError(
      'invalid',
      isTooLarge ? 'A file may hold 25 MB at most.' : 'The file did not come through. Send it again.',
    );
  }
}
