import 'server-only';
import { randomBytes } from 'node:crypto';

/** A new id: UUID version 7, so that keys grow with time. Not a secret. */
export function newId(): string {
  const bytes = randomBytes(16);
  bytes.writeUIntBE(Date.now(), 0, 6);
  bytes[6] = ((bytes[6] ?? 0) & 0x0f) | 0x70;
  bytes[8] = ((bytes[8] ?? 0) & 0x3f) | 0x80;
  const hex = bytes.toString('hex');
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join('-');
}

/** A secret for a link or a sign-in: 256 random bits. */
export function newSecret(): string {
  return randomBytes(32).toString('base64url');
}
