import { z } from 'zod';

const one = (value: unknown) => (Array.isArray(value) ? (value as unknown[])[0] : value);

/** `after` as it stands in an address: what the page was sorted by, a tilde, the order. */
const placeSchema = z
  .string()
  .regex(/^[\d\-: .+a-z]{1,40}~[0-9a-f-]{36}$/)
  .transform((text) => ({ key: text.split('~')[0] ?? '', orderId: text.split('~')[1] ?? '' }))
  .pipe(z.object({ key: z.string(), orderId: z.uuid() }));

const keys = {
  number: z.string().regex(/^\d{1,9}$/),
  waiting: z.string().refine((text) => !Number.isNaN(Date.parse(text.replace(/([+-]\d\d)$/, '$1:00')))),
  needed: z.iso.date().or(z.literal('infinity')),
} as const;

/** What may stand in the address of the list, for programs. */
export const WORK_ORDER_QUERY = {
  show: z.enum(['open', 'drafts', 'ended', 'all']).default('open'),
  find: z.string().max(80).describe('Beginnings of words: number, stamp, engine, other shop'),
  with: z.uuid().describe('Only orders with this shop'),
  move: z.enum(['any', 'mine', 'theirs']).default('any'),
  sort: z.enum(['number', 'waiting', 'needed']).default('number'),
  after: z.string().describe('Where the page before ended; taken from its `next`'),
} as const;

/** What the address of the list says; anything odd falls back to the first page of open orders. */
export const workOrderFilterSchema = z
  .object({
    show: z.preprocess(one, z.enum(['open', 'drafts', 'ended', 'all']).catch('open')),
    find: z.preprocess(one, z.string().trim().max(80).catch('')),
    with: z.preprocess(one, z.uuid().nullable().catch(null)),
    move: z.preprocess(one, z.enum(['any', 'mine', 'theirs']).catch('any')),
    sort: z.preprocess(one, z.enum(['number', 'waiting', 'needed']).catch('number')),
    after: z.preprocess(one, placeSchema.nullable().catch(null)),
  })
  .transform((filter) => {
    const isSound = filter.after !== null && keys[filter.sort].safeParse(filter.after.key).success;
    return { ...filter, after: isSound ? filter.after : null };
  });

/** The address of the list with a filter; what stands at its default is left out. */
export function workOrdersAddress(filter: z.infer<typeof workOrderFilterSchema>): string {
  const { show, find, with: shop, move, sort, after } = filter;
  const said = {
    ...(show === 'open' ? {} : { show }),
    ...(find === '' ? {} : { find }),
    ...(shop === null ? {} : { with: shop }),
    ...(move === 'any' ? {} : { move }),
    ...(sort === 'number' ? {} : { sort }),
    ...(after === null ? {} : { after: `${after.key}~${after.orderId}` }),
  };
  const query = new URLSearchParams(said).toString();
  return query === '' ? '/orders' : `/orders?${query}`;
}
