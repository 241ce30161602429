import { createHash } from 'node:crypto';
import type { IncomingMessage } from 'node:http';
import { crc32 } from 'node:zlib';

/** A request's body with what was said about it on the way. */
export interface Body {
  readonly bytes: Buffer;
  readonly checksums: Readonly<Record<string, string>>;
}

/** A body that is not what its sender said it was. */
export class BadBody extends Error {
  readonly code: string;
  constructor(code: string) {
    super(code);
    this.code = code;
  }
}

/** Reads a body, undoes aws-chunked, and checks length, digest and every checksum that was given, trailing ones too. */
export async function readBody(request: IncomingMessage): Promise<Body> {
  const chunks: Buffer[] = [];
  for await (const chunk of request) chunks.push(chunk as Buffer);
  const raw = Buffer.concat(chunks);
  const declared = request.headers['x-amz-content-sha256'];
  const isChunked = typeof declared === 'string' && declared.startsWith('STREAMING-');
  const { bytes, trailers } = isChunked ? unchunk(raw) : { bytes: raw, trailers: {} };
  checkDigests(request, bytes);
  return { bytes, checksums: checkSums(bytes, { ...headersOf(request), ...trailers }) };
}

function checkDigests(request: IncomingMessage, bytes: Buffer): void {
  const said = headersOf(request);
  const declared = said['x-amz-content-sha256'] ?? '';
  if (/^[0-9a-f]{64}$/.test(declared) && digest('sha256', bytes, 'hex') !== declared) {
    throw new BadBody('XAmzContentSHA256Mismatch');
  }
  const length = said['x-amz-decoded-content-length'];
  if (length !== undefined && Number(length) !== bytes.length) throw new BadBody('IncompleteBody');
  const md5 = said['content-md5'];
  if (md5 !== undefined && digest('md5', bytes, 'base64') !== md5) throw new BadBody('BadDigest');
}

function checkSums(bytes: Buffer, given: Readonly<Record<string, string>>): Record<string, string> {
  const sums: Readonly<Record<string, () => string>> = {
    'x-amz-checksum-crc32': () => crcOf(bytes),
    'x-amz-checksum-sha256': () => digest('sha256', bytes, 'base64'),
    'x-amz-checksum-sha1': () => digest('sha1', bytes, 'base64'),
  };
  const checked: Record<string, string> = {};
  for (const [name, sum] of Object.entries(sums)) {
    const said = given[name];
    if (said === undefined) continue;
    if (said !== sum()) throw new BadBody('BadDigest');
    checked[name] = said;
  }
  return checked;
}

function crcOf(bytes: Buffer): string {
  const four = Buffer.alloc(4);
  four.writeUInt32BE(crc32(bytes));
  return four.toString('base64');
}

function headersOf(request: IncomingMessage): Record<string, string> {
  return Object.fromEntries(
    Object.entries(request.headers).flatMap(([name, value]) =>
      typeof value === 'string' ? [[name, value]] : [],
    ),
  );
}

function unchunk(raw: Buffer): { bytes: Buffer; trailers: Record<string, string> } {
  const parts: Buffer[] = [];
  let at = 0;
  for (;;) {
    const end = raw.indexOf('\r\n', at);
    if (end < 0) throw new BadBody('IncompleteBody');
    const size = Number.parseInt(raw.subarray(at, end).toString().split(';')[0] ?? '', 16);
    if (Number.isNaN(size)) throw new BadBody('IncompleteBody');
    at = end + 2;
    if (size === 0) break;
    parts.push(raw.subarray(at, at + size));
    at += size + 2;
  }
  const lines = raw
    .subarray(at)
    .toString()
    .split('\r\n')
    .filter((line) => line.includes(':'));
  const trailers = Object.fromEntries(
    lines.map((line) => [
      line.slice(0, line.indexOf(':')).trim().toLowerCase(),
      line.slice(line.indexOf(':') + 1).trim(),
    ]),
  );
  return { bytes: Buffer.concat(parts), trailers };
}

/** A digest of bytes. */
export function digest(algorithm: 'md5' | 'sha256' | 'sha1', bytes: Buffer, form: 'hex' | 'base64'): string {
  return createHash(algorithm).update(bytes).digest(form);
}
