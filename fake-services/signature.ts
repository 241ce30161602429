import { createHash, createHmac, timingSafeEqual } from 'node:crypto';
import type { IncomingMessage } from 'node:http';

/** Keys that may sign. */
export interface SigningKeys {
  readonly accessKeyId: string;
  readonly secretAccessKey: string;
}

/** Checks AWS Signature Version 4, in the header or in the address, with its expiry. Answers why not, or null. */
export function signatureProblem(request: IncomingMessage, url: URL, keys: SigningKeys): string | null {
  const signed = url.searchParams.has('X-Amz-Signature') ? fromAddress(url) : fromHeader(request);
  if (!signed) return 'AccessDenied';
  if (!signed.credential.startsWith(`${keys.accessKeyId}/`)) return 'InvalidAccessKeyId';
  if (signed.expiresAt !== null && Date.now() > signed.expiresAt) return 'AccessDenied';
  return isSame(signatureOf(request, url, signed, keys), signed.signature) ? null : 'SignatureDoesNotMatch';
}

function signatureOf(request: IncomingMessage, url: URL, signed: Signed, keys: SigningKeys): string {
  const scope = signed.credential.split('/').slice(1);
  const canonical = [
    request.method ?? '',
    (request.url ?? '').split('?')[0] ?? '',
    canonicalQuery(url),
    ...signed.headers.map((name) => `${name}:${headerValue(request, name)}`),
    '',
    signed.headers.join(';'),
    signed.payloadHash,
  ].join('\n');
  const toSign = ['AWS4-HMAC-SHA256', signed.date, scope.join('/'), sha256(canonical)].join('\n');
  const signingKey = scope.reduce<Buffer | string>(
    (key, part) => hmac(key, part),
    `AWS4${keys.secretAccessKey}`,
  );
  return hmac(signingKey, toSign).toString('hex');
}

interface Signed {
  readonly credential: string;
  readonly date: string;
  readonly headers: readonly string[];
  readonly signature: string;
  readonly payloadHash: string;
  readonly expiresAt: number | null;
}

function fromAddress(url: URL): Signed | null {
  const get = (name: string) => url.searchParams.get(name) ?? '';
  const date = get('X-Amz-Date');
  const began = Date.parse(date.replace(/^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/, '$1-$2-$3T$4:$5:$6Z'));
  if (Number.isNaN(began)) return null;
  return {
    ...{ credential: get('X-Amz-Credential'), date, signature: get('X-Amz-Signature') },
    headers: get('X-Amz-SignedHeaders').split(';'),
    payloadHash: url.searchParams.get('X-Amz-Content-Sha256') ?? 'UNSIGNED-PAYLOAD',
    expiresAt: began + Number(get('X-Amz-Expires')) * 1000,
  };
}

function fromHeader(request: IncomingMessage): Signed | null {
  const match =
    /^AWS4-HMAC-SHA256 Credential=([^,]+), *SignedHeaders=([^,]+), *Signature=([0-9a-f]{64})$/.exec(
      request.headers.authorization ?? '',
    );
  const date = request.headers['x-amz-date'];
  const payloadHash = request.headers['x-amz-content-sha256'];
  if (!match || typeof date !== 'string' || typeof payloadHash !== 'string') return null;
  const [, credential = '', headers = '', signature = ''] = match;
  return { credential, date, headers: headers.split(';'), signature, payloadHash, expiresAt: null };
}

function canonicalQuery(url: URL): string {
  return [...url.searchParams.entries()]
    .filter(([name]) => name !== 'X-Amz-Signature')
    .map(([name, value]) => `${encode(name)}=${encode(value)}`)
    .sort((a, b) => (a < b ? -1 : 1))
    .join('&');
}

function headerValue(request: IncomingMessage, name: string): string {
  const value = request.headers[name];
  return (Array.isArray(value) ? value.join(',') : (value ?? '')).trim().replaceAll(/ +/g, ' ');
}

function encode(text: string): string {
  return encodeURIComponent(text).replaceAll(
    /[!'()*]/g,
    (letter) => `%${letter.charCodeAt(0).toString(16).toUpperCase()}`,
  );
}

function sha256(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}

function hmac(key: Buffer | string, text: string): Buffer {
  return createHmac('sha256', key).update(text).digest();
}

function isSame(a: string, b: string): boolean {
  return a.length === b.length && timingSafeEqual(Buffer.from(a), Buffer.from(b));
}
