import type { Facts, Side } from '@/lib/domain/orders/facts';
import { piecesMissing, whereabouts } from '@/lib/domain/orders/pieces';
import type { Stand } from '@/lib/domain/orders/stand';
import { printMoney } from '@/lib/domain/quantity/money';

/** What stands under each punch of the tag. */
export function sayPunches(
  facts: Facts,
  agreedMinor: number | null,
): Record<'price' | 'parts' | 'sizes', string> {
  const there = facts.parts.reduce((all, part) => all + whereabouts(part, facts).partner, 0);
  const all = facts.parts.reduce((sum, part) => sum + part.pieces, 0);
  const wrong = facts.parts
    .map((part) => piecesMissing(part, whereabouts(part, facts)))
    .find((words) => words !== null);
  const rev = facts.latestRev;
  return {
    price: agreedMinor === null ? priceWord(facts) : `agreed ${printMoney(agreedMinor)}`,
    parts: there === all && wrong ? wrong : `${there} of ${all} checked in`,
    sizes:
      facts.punches.sizes === 'not_needed'
        ? 'not needed'
        : rev === null
          ? 'no sizes yet'
          : `rev ${rev}${facts.punches.sizes === 'met' ? ' repeated back' : ''}`,
  };
}

function priceWord(facts: Facts): string {
  const open = facts.quotes.findLast((quote) => quote.state === 'open' || quote.state === 'ask');
  return open ? `${printMoney(open.totalMinor)} named` : 'not named';
}

/** The tag's last line: whether it may be cut, and whose move it is. */
export function sayVerdict(facts: Facts, stand: Stand, side: Side): string {
  if (facts.status === 'draft') return 'Draft. Nobody else sees it.';
  if (stand.stopped) return stand.clock === 'snag' ? 'A snag waits for its answer.' : 'Stopped.';
  if (stand.clear) {
    return facts.status === 'cutting'
      ? `Clear to cut. On the machine at ${facts.partner?.name ?? 'the shop'}.`
      : 'Clear to cut.';
  }
  return sayMove(stand, side) ?? ENDS[facts.status] ?? 'Nothing waits.';
}

function sayMove(stand: Stand, side: Side): string | null {
  const [own, theirs] =
    side === 'sender' ? [stand.senderStep, stand.partnerStep] : [stand.partnerStep, stand.senderStep];
  if (own !== null) return `Your move: ${lowered(own)}.`;
  return theirs === null ? null : `Their move: ${lowered(theirs)}.`;
}

function lowered(words: string): string {
  return `${words.charAt(0).toLowerCase()}${words.slice(1)}`;
}

const ENDS: Readonly<Record<string, string>> = {
  closed: 'Closed. Everything is home.',
  declined: 'Declined.',
  withdrawn: 'Withdrawn.',
  cancelled: 'Cancelled.',
};

/** The page on which a step is done. */
export function tabOf(step: string | null): 'price' | 'parts' | 'sizes' | 'readings' {
  if (step === null) return 'sizes';
  if (/price|owed|quote/i.test(step)) return 'price';
  if (/parts/i.test(step)) return 'parts';
  if (/machine|cut,|report|decide$|decide about|snag|hold/i.test(step)) return 'readings';
  return 'sizes';
}
