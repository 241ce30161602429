import { randomUUID } from 'node:crypto';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { BadBody, type Body, digest, readBody } from './body';
import { listPage } from './object-list';
import { Shelf } from './shelf';
import { escape, unescape, xml } from './xml';
import { signatureProblem, type SigningKeys } from './signature';

/** What a web application uses of S3, on this machine alone. */
export interface ObjectStore {
  readonly close: () => Promise<void>;
}

interface StoreOptions extends SigningKeys {
  readonly port: number;
  readonly folder: string;
  readonly buckets: readonly string[];
}

interface Asked {
  readonly request: IncomingMessage;
  readonly response: ServerResponse;
  readonly url: URL;
  readonly bucket: string;
  readonly key: string;
  readonly body: Body;
}

/** A refusal with S3's own code. */
class Refusal extends Error {
  readonly status: number;
  readonly code: string;
  constructor(status: number, code: string) {
    super(code);
    this.status = status;
    this.code = code;
  }
}

/** Starts the store on loopback. */
export async function startObjectStore(options: StoreOptions): Promise<ObjectStore> {
  const shelf = new Shelf(options.folder, options.buckets);
  const uploads = new Map<string, { headers: Record<string, string>; parts: Map<number, Buffer> }>();
  const server = createServer((request, response) => {
    answer({ shelf, uploads, options }, request, response).catch((error: unknown) =>
      refuse(request, response, error),
    );
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(options.port, '127.0.0.1', resolve);
  });
  return { close: () => new Promise((resolve) => server.close(() => resolve())) };
}

interface Store {
  readonly shelf: Shelf;
  readonly uploads: Map<string, { headers: Record<string, string>; parts: Map<number, Buffer> }>;
  readonly options: StoreOptions;
}

async function answer(store: Store, request: IncomingMessage, response: ServerResponse): Promise<void> {
  const url = new URL(request.url ?? '/', 'http://store');
  const problem = signatureProblem(request, url, store.options);
  const body = await readBody(request);
  if (problem !== null) throw new Refusal(403, problem);
  const [bucket = '', ...rest] = decodeURIComponent(url.pathname).slice(1).split('/');
  const asked = { request, response, url, bucket, key: rest.join('/'), body };
  if (asked.key === '') answerBucket(store, asked);
  else answerObject(store, asked);
}

function answerBucket(store: Store, asked: Asked): void {
  const { request, response, url, bucket } = asked;
  if (request.method === 'PUT') {
    if (!store.shelf.addBucket(bucket)) throw new Refusal(409, 'BucketAlreadyOwnedByYou');
    response.end();
    return;
  }
  if (!store.shelf.hasBucket(bucket)) throw new Refusal(404, 'NoSuchBucket');
  if (request.method === 'POST' && url.searchParams.has('delete')) {
    const keys = [...asked.body.bytes.toString().matchAll(/<Key>([^<]*)<\/Key>/g)].map(([, key = '']) =>
      unescape(key),
    );
    for (const key of keys) store.shelf.remove(bucket, key);
    xml(
      response,
      `<DeleteResult>${keys.map((key) => `<Deleted><Key>${escape(key)}</Key></Deleted>`).join('')}</DeleteResult>`,
    );
    return;
  }
  if (request.method === 'HEAD') {
    response.end();
    return;
  }
  xml(asked.response, listPage(store.shelf, bucket, url));
}

function answerObject(store: Store, asked: Asked): void {
  const { request, url, bucket, key } = asked;
  if (!store.shelf.hasBucket(bucket)) throw new Refusal(404, 'NoSuchBucket');
  const { method } = request;
  if (method === 'POST' || url.searchParams.has('uploadId')) {
    answerUpload(store, asked);
    return;
  }
  if (method === 'PUT') {
    put(store, asked);
    return;
  }
  if (method === 'DELETE') {
    store.shelf.remove(bucket, key);
    asked.response.writeHead(204).end();
    return;
  }
  get(store, asked);
}

function put({ shelf }: Store, { request, response, bucket, key, body }: Asked): void {
  if (request.headers['if-none-match'] === '*' && shelf.notes(bucket, key))
    throw new Refusal(412, 'PreconditionFailed');
  const source = request.headers['x-amz-copy-source'];
  if (typeof source === 'string') {
    const [from = '', ...rest] = decodeURIComponent(source).replace(/^\//, '').split('/');
    const notes = shelf.notes(from, rest.join('/'));
    if (!notes) throw new Refusal(404, 'NoSuchKey');
    shelf.put(bucket, { ...notes, key, at: new Date().toISOString() }, shelf.bytes(from, notes.key));
    xml(
      response,
      `<CopyObjectResult><ETag>${notes.etag}</ETag><LastModified>${notes.at}</LastModified></CopyObjectResult>`,
    );
    return;
  }
  const etag = `"${digest('md5', body.bytes, 'hex')}"`;
  shelf.put(
    bucket,
    { key, etag, bytes: body.bytes.length, at: new Date().toISOString(), headers: keptHeaders(request) },
    body.bytes,
  );
  response.writeHead(200, { etag, ...body.checksums }).end();
}

function get({ shelf }: Store, { request, response, url, bucket, key }: Asked): void {
  const notes = shelf.notes(bucket, key);
  if (!notes) throw new Refusal(404, request.method === 'HEAD' ? 'NotFound' : 'NoSuchKey');
  const bytes = shelf.bytes(bucket, key);
  const overrides = Object.fromEntries(
    [...url.searchParams.entries()].flatMap(([name, value]) =>
      name.startsWith('response-') ? [[name.slice('response-'.length), value]] : [],
    ),
  );
  const headers = {
    ...notes.headers,
    ...overrides,
    etag: notes.etag,
    'last-modified': new Date(notes.at).toUTCString(),
    'accept-ranges': 'bytes',
  };
  const range = /^bytes=(\d+)-(\d*)$/.exec(request.headers.range ?? '');
  if (!range) {
    response
      .writeHead(200, { ...headers, 'content-length': bytes.length })
      .end(request.method === 'HEAD' ? undefined : bytes);
    return;
  }
  const from = Number(range[1]);
  const to = range[2] === '' ? bytes.length - 1 : Math.min(Number(range[2]), bytes.length - 1);
  if (from > to) throw new Refusal(416, 'InvalidRange');
  const part = bytes.subarray(from, to + 1);
  response
    .writeHead(206, {
      ...headers,
      'content-length': part.length,
      'content-range': `bytes ${from}-${to}/${bytes.length}`,
    })
    .end(part);
}

function answerUpload({ shelf, uploads }: Store, asked: Asked): void {
  const { request, response, url, bucket, key, body } = asked;
  if (url.searchParams.has('uploads')) {
    const id = randomUUID();
    uploads.set(id, { headers: keptHeaders(request), parts: new Map() });
    xml(
      response,
      `<InitiateMultipartUploadResult><Bucket>${bucket}</Bucket><Key>${escape(key)}</Key><UploadId>${id}</UploadId></InitiateMultipartUploadResult>`,
    );
    return;
  }
  const id = url.searchParams.get('uploadId') ?? '';
  const upload = uploads.get(id);
  if (!upload) throw new Refusal(404, 'NoSuchUpload');
  if (request.method === 'PUT') {
    upload.parts.set(Number(url.searchParams.get('partNumber')), body.bytes);
    response.writeHead(200, { etag: `"${digest('md5', body.bytes, 'hex')}"`, ...body.checksums }).end();
    return;
  }
  uploads.delete(id);
  if (request.method === 'DELETE') {
    response.writeHead(204).end();
    return;
  }
  const parts = [...upload.parts.entries()].sort(([a], [b]) => a - b).map(([, bytes]) => bytes);
  const all = Buffer.concat(parts);
  const sums = Buffer.concat(parts.map((part) => Buffer.from(digest('md5', part, 'hex'), 'hex')));
  const etag = `"${digest('md5', sums, 'hex')}-${parts.length}"`;
  shelf.put(
    bucket,
    { key, etag, bytes: all.length, at: new Date().toISOString(), headers: upload.headers },
    all,
  );
  xml(
    response,
    `<CompleteMultipartUploadResult><Bucket>${bucket}</Bucket><Key>${escape(key)}</Key><ETag>${etag}</ETag></CompleteMultipartUploadResult>`,
  );
}

function keptHeaders(request: IncomingMessage): Record<string, string> {
  const isKept = (name: string) =>
    ['content-type', 'content-disposition', 'cache-control', 'content-language'].includes(name) ||
    name.startsWith('x-amz-meta-');
  return Object.fromEntries(
    Object.entries(request.headers).flatMap(([name, value]) =>
      isKept(name) && typeof value === 'string' ? [[name, value]] : [],
    ),
  );
}

function refuse(request: IncomingMessage, response: ServerResponse, error: unknown): void {
  const [status, code] =
    error instanceof Refusal
      ? [error.status, error.code]
      : error instanceof BadBody
        ? [400, error.code]
        : [500, 'InternalError'];
  if (response.headersSent) {
    response.end();
    return;
  }
  response.writeHead(status, { 'content-type': 'application/xml' });
  response.end(
    request.method === 'HEAD'
      ? undefined
      : `<?xml version="1.0"?><Error><Code>${code}</Code><Message>${code}</Message></Error>`,
  );
}
