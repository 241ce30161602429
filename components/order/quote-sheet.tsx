import { printMoney } from '@/lib/domain/quantity/money';
import { sayDay } from '@/lib/forms/say';

interface QuoteSheetProps {
  currency: string;
  quote: {
    readonly revision: number;
    readonly kind: 'inspection' | 'work' | 'settlement';
    readonly lines: readonly { readonly title: string; readonly amountMinor: number }[];
    readonly extras: readonly { readonly words: string; readonly amountMinor: number }[];
    readonly taxMinor: number;
    readonly totalMinor: number;
    readonly promisedOn: string | null;
    readonly promiseDays: number | null;
    readonly validUntil: string | null;
    readonly note: string;
    readonly author: string;
    readonly answers: readonly { readonly answer: string; readonly note: string; readonly author: string }[];
  };
}

const KINDS = { work: 'The work', inspection: 'Inspection fee', settlement: 'What is owed' } as const;
const ANSWERS: Readonly<Record<string, string>> = {
  ask: 'asked',
  agree: 'agreed',
  turn_down: 'turned down',
  void: 'void: something newer came',
  expired: 'ran out',
};

/** One revision of the price as a column of figures with a rule under it. */
export function QuoteSheet({ quote, currency }: QuoteSheetProps) {
  const rows = [
    ...quote.lines.map(({ title, amountMinor }) => [title, amountMinor] as const),
    ...quote.extras.map(({ words, amountMinor }) => [words, amountMinor] as const),
    ...(quote.taxMinor > 0 ? [['Tax', quote.taxMinor] as const] : []),
  ];
  const year = new Date().getUTCFullYear();
  return (
    <section className="mb-4 border-b border-rule-2 pb-4">
      <h3>
        {KINDS[quote.kind]}, no. {quote.revision} <span className="note font-normal">by {quote.author}</span>
      </h3>
      <table className="mt-2 w-full max-w-xl text-[16px]">
        <tbody>
          {rows.map(([words, amount]) => (
            <tr key={words}>
              <th scope="row" className="py-1 text-left font-normal">
                {words}
              </th>
              <td className="num text-right">{printMoney(amount)}</td>
            </tr>
          ))}
          <tr className="border-t-2 border-ink">
            <th scope="row" className="pt-1.5 text-left text-[20px] font-semibold">
              Total {currency}
            </th>
            <td className="num pt-1.5 text-right text-[22px] font-semibold">
              {printMoney(quote.totalMinor)}
            </td>
          </tr>
        </tbody>
      </table>
      <p className="note mt-2">
        {quote.promisedOn !== null && `Ready ${sayDay(quote.promisedOn, year)}. `}
        {quote.promiseDays !== null && `Ready ${quote.promiseDays} working days from clear to cut. `}
        {quote.validUntil !== null && `Valid until ${sayDay(quote.validUntil, year)}. `}
        {quote.note}
      </p>
      {quote.answers.map((answer, index) => (
        <p key={index} className="mt-1 text-[15px]">
          <b className="font-semibold">{ANSWERS[answer.answer]}</b> by {answer.author}
          {answer.note === '' ? '' : `: ${answer.note}`}
        </p>
      ))}
    </section>
  );
}
