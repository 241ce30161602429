import { describe, expect, it } from 'vitest';
import { decide } from '@/lib/domain/orders/decide';
import type { Facts } from '@/lib/domain/orders/facts';
import { piecesMissing, whereabouts } from '@/lib/domain/orders/pieces';
import { factsOf } from '../../support/facts';

const RODS = { id: 'rods', kind: 'rods', pieces: 8, stamps: ['1', '2', '3', '4', '5', '6', '7', '8'] };
const move = (id: string, kind: 'sent' | 'checked_in', stamps: readonly string[]) => ({
  ...{ id, partId: 'rods', kind, pieces: stamps.length, stamps, kit: [], replacesId: null },
});
const asking = {
  ...{ actor: { roles: ['bench'] as const }, side: 'partner' as const, now: '2026-11-24T10:15:00Z' },
  ...{ today: '2026-11-24', dayAfter: () => '2026-12-01' },
};
const restamp = (from: string, to: string) => ({
  ...{ do: 'restamp' as const, id: 'r', partId: 'rods', from, to, words: 'bright beam, belongs to cap 6' },
});

// Job 8 of tests/reference/data/jobs.md: the right count of the wrong pieces, and what puts it right.
describe('eight rods of which none is stamped 6', () => {
  const hold = {
    ...{ id: 'h', lineId: null, reason: 'parts' as const, words: 'none is 6' },
    ...{ waitsFor: 'sender' as const, placedBy: 'partner' as const },
  };
  const line = {
    ...{
      id: 'resize',
      operation: 'crack_test',
      title: 'Resize',
      needsSizes: false,
      started: false,
      stopDue: false,
    },
    ...{ partIds: ['rods'], kit: [], required: [] },
  };
  const facts: Facts = factsOf('agreed', {
    ...{ parts: [RODS], lines: [line], holds: [hold] },
    quotes: [
      {
        ...{ revision: 1, kind: 'work', totalMinor: 26_800, promisedOn: '2026-12-01', promiseDays: null },
        ...{ validUntil: null, state: 'agree' },
      },
    ],
    moves: [
      move('a', 'sent', RODS.stamps),
      move('b', 'checked_in', ['1', '2', '3', '4', '5', '7', '8']),
      move('c', 'checked_in', ['5']),
    ],
  });

  it('are eight of eight, and still not the parts on the list', () => {
    expect(piecesMissing(RODS, whereabouts(RODS, facts))).toBe('rods: two are stamped 5, none is 6');
    expect(facts.moves.slice(1).reduce((all, one) => all + one.pieces, 0)).toBe(8);
  });

  it('are right once the second 5 is restamped 6: parts met, the hold lifted, clear to cut', () => {
    const decided = decide(facts, restamp('5', '6'), asking);
    if (!decided.ok) throw new Error(decided.problem.words);
    expect(decided.value.stand.punches.parts).toBe('met');
    expect(decided.value.facts.holds).toEqual([]);
    expect(decided.value.stand.clear).toBe(true);
    expect(decided.value.events[0]).toEqual({
      type: 'order.restamp',
      payload: { restampId: 'r', kind: 'rods', from: '5', to: '6', words: 'bright beam, belongs to cap 6' },
    });
  });

  it('stay as they are when the stamp is not there, is the same, or the other shop would do it', () => {
    const words = (command: ReturnType<typeof restamp>, more = {}) => {
      const decided = decide(facts, command, { ...asking, ...more });
      return decided.ok ? 'done' : decided.problem.words;
    };
    expect(words(restamp('9', '6'))).toBe('None of the rods here is stamped 9.');
    expect(words(restamp('5', ' 5 '))).toBe('Give the new stamp.');
    expect(words(restamp('5', '6'), { side: 'sender' })).toBe('This is for the other shop to do.');
    // Another stamp that is not on the list leaves the hold where it is.
    const wrong = decide(facts, restamp('5', '9'), asking);
    expect(wrong.ok && wrong.value.stand.punches.parts).toBe('unmet');
    expect(wrong.ok && wrong.value.facts.holds).toHaveLength(1);
  });
});
