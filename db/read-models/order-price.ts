import 'server-only';
import type { Tx } from '@/db/client';
import type { QuoteKind, QuoteState } from '@/lib/domain/orders/facts';

export interface QuoteView {
  readonly revision: number;
  readonly kind: QuoteKind;
  readonly lines: readonly { readonly title: string; readonly amountMinor: number }[];
  readonly extras: readonly { readonly words: string; readonly amountMinor: number }[];
  readonly taxMinor: number;
  readonly totalMinor: number;
  readonly promisedOn: string | null;
  readonly promiseDays: number | null;
  readonly validUntil: string | null;
  readonly note: string;
  readonly author: string;
  readonly at: string;
  readonly answers: readonly {
    readonly answer: QuoteState;
    readonly note: string;
    readonly author: string;
  }[];
}

/** Every revision of the price, newest first: one statement. */
export async function loadQuotes(tx: Tx, orderId: string): Promise<QuoteView[]> {
  const { rows } = await tx.raw<{ rows: QuoteView[] }>(
    `select q.revision, q.kind, q.extras, q.tax_minor as "taxMinor", q.total_minor as "totalMinor", q.promised_on::text as "promisedOn",
       q.promise_days as "promiseDays", q.valid_until::text as "validUntil", q.note, q.author_name as author, q.at,
       coalesce((select json_agg(json_build_object('title', l.title, 'amountMinor', z.amount_minor) order by l.position)
         from quote_lines z join order_lines l on l.id = z.line_id where z.order_id = q.order_id and z.revision = q.revision), '[]') as lines,
       coalesce((select json_agg(json_build_object('answer', a.answer, 'note', a.note, 'author', a.author_name) order by a.at)
         from quote_answers a where a.order_id = q.order_id and a.revision = q.revision), '[]') as answers
     from quotes q where q.order_id = ? order by q.revision desc`,
    [orderId],
  );
  return rows;
}
