import type { Shelf } from './shelf';
import { escape } from './xml';

/** One page of a bucket's objects, as ListObjectsV2 answers it. */
export function listPage(shelf: Shelf, bucket: string, url: URL): string {
  const get = (name: string) => url.searchParams.get(name) ?? '';
  const [prefix, delimiter, after] = [get('prefix'), get('delimiter'), get('continuation-token')];
  const most = Number(url.searchParams.get('max-keys') ?? 1000);
  const found = shelf.list(bucket).filter(({ key }) => key.startsWith(prefix) && key > after);
  const isGrouped = (key: string) => delimiter !== '' && key.slice(prefix.length).includes(delimiter);
  const groups = [
    ...new Set(
      found
        .filter(({ key }) => isGrouped(key))
        .map(({ key }) => key.slice(0, key.indexOf(delimiter, prefix.length) + 1)),
    ),
  ];
  const own = found.filter(({ key }) => !isGrouped(key));
  const page = own.slice(0, most);
  const isCut = own.length > page.length;
  const contents = page.map(
    ({ key, etag, bytes, at }) =>
      `<Contents><Key>${escape(key)}</Key><LastModified>${at}</LastModified><ETag>${etag}</ETag><Size>${bytes}</Size></Contents>`,
  );
  const common = groups.map((group) => `<CommonPrefixes><Prefix>${escape(group)}</Prefix></CommonPrefixes>`);
  const next = isCut
    ? `<NextContinuationToken>${escape(page.at(-1)?.key ?? '')}</NextContinuationToken>`
    : '';
  return `<ListBucketResult><Name>${bucket}</Name><KeyCount>${page.length}</KeyCount><IsTruncated>${String(isCut)}</IsTruncated>${next}${contents.join('')}${common.join('')}</ListBucketResult>`;
}
