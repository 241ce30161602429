import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';

/** What is kept beside an object's bytes. */
export interface ObjectNotes {
  readonly key: string;
  readonly etag: string;
  readonly bytes: number;
  readonly at: string;
  readonly headers: Readonly<Record<string, string>>;
}

/** Objects on disk: for each a file of bytes and a file of notes, named by the hash of the key. */
export class Shelf {
  readonly #folder: string;

  constructor(folder: string, buckets: readonly string[]) {
    this.#folder = folder;
    for (const bucket of buckets) this.addBucket(bucket);
  }

  addBucket(bucket: string): boolean {
    const folder = path.join(this.#folder, bucket);
    if (existsSync(folder)) return false;
    mkdirSync(folder, { recursive: true });
    return true;
  }

  hasBucket(bucket: string): boolean {
    return /^[a-z0-9.-]{3,63}$/.test(bucket) && existsSync(path.join(this.#folder, bucket));
  }

  put(bucket: string, notes: ObjectNotes, bytes: Buffer): void {
    const file = this.#file(bucket, notes.key);
    writeFileSync(`${file}.new`, bytes);
    renameSync(`${file}.new`, `${file}.bytes`);
    writeFileSync(`${file}.json`, JSON.stringify(notes));
  }

  notes(bucket: string, key: string): ObjectNotes | undefined {
    const file = `${this.#file(bucket, key)}.json`;
    return existsSync(file) ? (JSON.parse(readFileSync(file, 'utf8')) as ObjectNotes) : undefined;
  }

  bytes(bucket: string, key: string): Buffer {
    return readFileSync(`${this.#file(bucket, key)}.bytes`);
  }

  remove(bucket: string, key: string): void {
    rmSync(`${this.#file(bucket, key)}.json`, { force: true });
    rmSync(`${this.#file(bucket, key)}.bytes`, { force: true });
  }

  list(bucket: string): ObjectNotes[] {
    return readdirSync(path.join(this.#folder, bucket))
      .filter((name) => name.endsWith('.json'))
      .map((name) => JSON.parse(readFileSync(path.join(this.#folder, bucket, name), 'utf8')) as ObjectNotes)
      .sort((a, b) => (a.key < b.key ? -1 : 1));
  }

  #file(bucket: string, key: string): string {
    return path.join(this.#folder, bucket, createHash('sha256').update(key).digest('hex'));
  }
}
