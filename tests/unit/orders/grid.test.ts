import { describe, expect, it } from 'vitest';
import { can, type Role, ROLES } from '@/lib/domain/actor';
import type { Command, CommandKind } from '@/lib/domain/orders/commands';
import { allowedCommands, decide } from '@/lib/domain/orders/decide';
import { type Side, STATUSES } from '@/lib/domain/orders/facts';
import { COMMAND_KINDS, ORDER_RULES, type OrderRule } from '@/lib/domain/orders/rules';
import { factsOf } from '../../support/facts';

/** One command of each kind, as plain as it can be; whether its own guard lets it through is another test's matter. */
const SAMPLES: { readonly [K in CommandKind]: Extract<Command, { do: K }> } = {
  send: { do: 'send' },
  change: { do: 'change', neededBackOn: null, notes: '', standingInstruction: '' },
  withdraw: { do: 'withdraw', reason: 'x' },
  quote: {
    do: 'quote',
    kind: 'work',
    lines: [],
    extras: [],
    taxMinor: 0,
    promisedOn: null,
    promiseDays: 3,
    validUntil: null,
    note: '',
  },
  decline: { do: 'decline', reason: 'x' },
  ask: { do: 'ask', revision: 1, note: 'x' },
  turn_down: { do: 'turn_down', revision: 1, note: '' },
  agree: { do: 'agree', revision: 1 },
  expire: { do: 'expire', revision: 1 },
  cancel: { do: 'cancel', reason: 'x' },
  settle: { do: 'settle', totalMinor: 1, note: '' },
  answer_settlement: { do: 'answer_settlement', agree: true, note: '' },
  release: { do: 'release', lines: [], reason: '' },
  repeat_back: { do: 'repeat_back', rev: 1, sizes: [] },
  move_parts: { do: 'move_parts', kind: 'sent', parts: [], occurredAt: '2026-12-01T08:00:00Z' },
  restamp: { do: 'restamp', id: 'r', partId: 'crank', from: 'F318', to: 'F319', words: '' },
  hold: { do: 'hold', id: 'h', lineId: null, reason: 'other', words: 'x', waitsFor: 'sender' },
  answer_hold: { do: 'answer_hold', holdId: 'h', words: '' },
  lift_hold: { do: 'lift_hold', holdId: 'h' },
  move_promise: { do: 'move_promise', promisedOn: '2026-12-24', reason: 'x' },
  start: { do: 'start', lineId: 'wash' },
  answer_stop: { do: 'answer_stop', cut: [] },
  report: { do: 'report', unread: [] },
  raise_snag: {
    do: 'raise_snag',
    id: 'g',
    lineId: null,
    kind: 'crack',
    words: 'x',
    proposal: 'y',
    priceMinor: 0,
    days: 0,
  },
  approve_snag: { do: 'approve_snag', snagId: 'g', words: '', newSizes: false },
  ask_snag: { do: 'ask_snag', snagId: 'g', words: 'x' },
  reply_snag: { do: 'reply_snag', snagId: 'g', words: 'x' },
  decline_snag: { do: 'decline_snag', snagId: 'g', words: 'x', carryOn: true },
  decide: { do: 'decide', decisions: [] },
};

const SIDES: readonly Side[] = ['sender', 'partner'];
const cells = COMMAND_KINDS.flatMap((kind) =>
  STATUSES.flatMap((status) => SIDES.flatMap((side) => ROLES.map((role) => ({ kind, status, side, role })))),
);

function asking(side: Side, role: Role) {
  return {
    actor: { roles: [role] },
    side,
    now: '2026-12-01T08:00:00Z',
    today: '2026-12-01',
    dayAfter: () => '2026-12-09',
  };
}

describe('the grid: every command × status × side × role', () => {
  it('has a cell for each', () => {
    expect(cells).toHaveLength(COMMAND_KINDS.length * STATUSES.length * 2 * 3);
  });

  it.each(COMMAND_KINDS)('%s: the rule table decides, in this order: side, role, status', (kind) => {
    const rule: OrderRule = ORDER_RULES[kind];
    for (const { status, side, role } of cells.filter((cell) => cell.kind === kind)) {
      const decided = decide(factsOf(status), SAMPLES[kind], asking(side, role));
      const problem = decided.ok ? 'none' : decided.problem.code;
      const where = `${kind} by ${side} ${role} when ${status}`;
      if (rule.side !== 'either' && rule.side !== side) expect(problem, where).toBe('not_your_move');
      else if (!can({ roles: [role] }, rule.permission)) expect(problem, where).toBe('not_permitted');
      else if (!rule.from.includes(status)) expect(problem, where).toBe('wrong_status');
      else expect(['none', 'refused', 'not_your_move'], where).toContain(problem);
    }
  });

  it('offers exactly what the table lets through', () => {
    for (const { status, side, role } of cells.filter((cell) => cell.kind === 'send')) {
      const offered = allowedCommands(factsOf(status), { actor: { roles: [role] }, side });
      const expected = COMMAND_KINDS.filter((kind) => {
        const rule: OrderRule = ORDER_RULES[kind];
        return (
          kind !== 'expire' &&
          [side, 'either'].includes(rule.side) &&
          can({ roles: [role] }, rule.permission) &&
          rule.from.includes(status)
        );
      });
      expect(offered).toEqual(expected);
    }
  });
});
