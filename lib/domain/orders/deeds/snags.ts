import { no, type Deeds, type Refusal } from '@/lib/domain/orders/deed';
import type { Facts, SnagFact } from '@/lib/domain/orders/facts';
import { ok } from '@/lib/domain/result';

/** What the partner meets on the part or the machine, and the sender's answer. */
export const SNAG_DEEDS: Deeds<'raise_snag' | 'approve_snag' | 'ask_snag' | 'reply_snag' | 'decline_snag'> = {
  raise_snag: (facts, { id, lineId, kind, words, proposal, priceMinor, days }) => {
    if (words.trim() === '') return no('Say what you met.');
    if (proposal.trim() === '') return no('Say what you propose.');
    if (lineId !== null && !facts.lines.some((line) => line.id === lineId))
      return no('That line is not on this order.');
    const snag: SnagFact = { id, lineId, state: 'raised', sizesDue: false, priceMinor, days };
    return ok({
      changes: [{ row: 'snag', snag, kind, words, proposal }],
      note: { snagId: id, kind, words, proposal, priceMinor, days },
    });
  },

  approve_snag: (facts, { snagId, words, newSizes }) => {
    const snag = open(facts, snagId);
    if (!snag) return gone();
    return ok({
      changes: [
        { row: 'snag_answer', snagId, answer: 'approve', words },
        { row: 'snag_set', snagId, state: 'approved', sizesDue: newSizes },
      ],
      note: { words, newSizes, priceMinor: snag.priceMinor, days: snag.days },
    });
  },

  ask_snag: (facts, { snagId, words }) => {
    if (!open(facts, snagId)) return gone();
    if (words.trim() === '') return no('Write what you want to know.');
    return ok({
      changes: [
        { row: 'snag_answer', snagId, answer: 'ask', words },
        { row: 'snag_set', snagId, state: 'asked', sizesDue: false },
      ],
      note: { words },
    });
  },

  reply_snag: (facts, { snagId, words }) => {
    if (open(facts, snagId)?.state !== 'asked') return no('Nothing was asked about that snag.');
    if (words.trim() === '') return no('Write the answer.');
    return ok({
      changes: [
        { row: 'snag_answer', snagId, answer: 'reply', words },
        { row: 'snag_set', snagId, state: 'raised', sizesDue: false },
      ],
      note: { words },
    });
  },

  decline_snag: (facts, { snagId, words, carryOn }) => {
    if (!open(facts, snagId)) return gone();
    if (words.trim() === '') return no('Say why.');
    return ok({
      changes: [
        { row: 'snag_answer', snagId, answer: carryOn ? 'decline_carry_on' : 'decline_stop', words },
        { row: 'snag_set', snagId, state: 'declined', sizesDue: false },
        ...(carryOn
          ? []
          : [
              {
                row: 'hold' as const,
                hold: {
                  ...{ id: snagId, lineId: null, reason: 'decision' as const, words },
                  ...{ waitsFor: 'sender' as const, placedBy: 'sender' as const },
                },
              },
            ]),
      ],
      note: { words, carryOn },
    });
  },
};

function open(facts: Facts, snagId: string): SnagFact | undefined {
  return facts.snags.find((snag) => snag.id === snagId && snag.state !== 'approved');
}

function gone(): { ok: false; problem: Refusal } {
  return no('That snag is answered already.');
}
