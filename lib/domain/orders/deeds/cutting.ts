import type { Change } from '@/lib/domain/orders/changes';
import { no, type Deeds } from '@/lib/domain/orders/deed';
import type { Facts } from '@/lib/domain/orders/facts';
import { piecesAway } from '@/lib/domain/orders/pieces';
import { whyNotClear } from '@/lib/domain/orders/stand';
import { fail, ok } from '@/lib/domain/result';

/** Holds, cutting, the answer to a STOP, reporting, and the decision on the work. */
export const CUTTING_DEEDS: Deeds<
  'hold' | 'answer_hold' | 'lift_hold' | 'start' | 'answer_stop' | 'report' | 'decide'
> = {
  hold: (_facts, { id, lineId, reason, words, waitsFor }, { side }) => {
    if (words.trim() === '') return no('Say what it waits for.');
    const hold = { id, lineId, reason, words, waitsFor, placedBy: side };
    return ok({ changes: [{ row: 'hold', hold }], note: { reason, words, waitsFor } });
  },

  answer_hold: (facts, { holdId, words }, { side }) => {
    const hold = facts.holds.find((one) => one.id === holdId);
    if (!hold) return no('That hold is lifted already.');
    if (hold.waitsFor !== side)
      return fail({ code: 'not_your_move', words: 'The hold waits for the other shop.' });
    const waitsFor = hold.placedBy;
    if (waitsFor === side)
      return ok({ changes: [{ row: 'hold_set', holdId, lifted: true }], note: { words } });
    return ok({ changes: [{ row: 'hold_set', holdId, waitsFor }], note: { words, waitsFor } });
  },

  lift_hold: (facts, { holdId }, { side }) => {
    const hold = facts.holds.find((one) => one.id === holdId);
    if (!hold) return no('That hold is lifted already.');
    if (hold.placedBy !== side)
      return fail({ code: 'not_your_move', words: 'The shop that put the hold on lifts it.' });
    return ok({ changes: [{ row: 'hold_set', holdId, lifted: true }], note: { words: hold.words } });
  },

  start: (facts, { lineId }) => {
    const line = facts.lines.find((one) => one.id === lineId);
    if (!line) return no('That line is not on this order.');
    if (line.started) return no('That line is on the machine already.');
    const why = whyNotClear(facts, line);
    if (why !== null) return no(`Not clear to cut. ${why}`);
    const status: Change[] = facts.status === 'agreed' ? [{ row: 'order', set: { status: 'cutting' } }] : [];
    return ok({ changes: [{ row: 'line', lineId, started: true }, ...status], note: { line: line.title } });
  },

  answer_stop: (facts, { cut }) => {
    const stopped = facts.lines.filter((line) => line.stopDue);
    if (stopped.length === 0) return no('Nothing is stopped by a new rev.');
    const features = facts.sizes.filter((size) => stopped.some((line) => line.id === size.lineId));
    const silent = features.find(
      (size) => !cut.some((said) => said.lineId === size.lineId && said.feature === size.feature),
    );
    if (silent)
      return no(
        `Say whether ${silent.what.toLowerCase()} ${silent.feature} is cut already, and to what size.`,
      );
    return ok({
      changes: stopped.map((line) => ({ row: 'line', lineId: line.id, stopDue: false })),
      note: {
        rev: facts.latestRev,
        cut: cut
          .filter((said) => said.size !== null)
          .map(({ lineId, feature, size, text }) => ({ lineId, feature, size, text })),
      },
    });
  },

  report: (facts, { unread }) => {
    for (const line of facts.lines) {
      if (!line.started) return no(`${line.title} has not been on the machine.`);
      const why = whyNotClear(facts, line);
      if (why !== null) return no(`${line.title}: ${why}`);
      const missing = unreadPlaces(facts, line.id, line.required);
      const reason = unread.find((one) => one.lineId === line.id)?.reason.trim() ?? '';
      if (missing.length > 0 && reason === '') {
        return no(
          `${line.title}: ${missing.length} of ${line.required.length} places are not read. Post them, or say why not.`,
        );
      }
    }
    return ok({ changes: [{ row: 'order', set: { status: 'reported' } }], note: { unread } });
  },

  decide: (facts, { decisions }) => {
    const wrong = decisionProblem(facts, decisions);
    if (wrong !== null) return no(wrong);
    const rows: Change[] = decisions.map(({ lineId, decision, reason, features }) => ({
      row: 'decision',
      lineId,
      decision,
      reason,
      features,
    }));
    const titles = decisions.map(({ lineId, decision, reason, features }) => ({
      line: facts.lines.find((line) => line.id === lineId)?.title ?? '',
      ...{ decision, reason, features },
    }));
    if (decisions.some(({ decision }) => decision === 'send_back')) {
      return ok({
        changes: [...rows, { row: 'order', set: { status: 'cutting', round: facts.round + 1 } }],
        note: { decisions: titles, round: facts.round },
      });
    }
    const status = decisions.some(({ decision }) => decision === 'reject') ? 'rejected' : 'accepted';
    return ok({
      changes: [...rows, { row: 'order', set: { status } }],
      note: { decisions: titles, round: facts.round },
    });
  },
};

/** Places of a line that must be read in this round and are not. */
export function unreadPlaces(facts: Facts, lineId: string, required: readonly string[]): string[] {
  const read = new Set(
    facts.read.filter((one) => one.lineId === lineId && one.round === facts.round).map((one) => one.place),
  );
  return required.filter((place) => !read.has(place));
}

function decisionProblem(
  facts: Facts,
  decisions: readonly { readonly lineId: string; readonly decision: string; readonly reason: string }[],
): string | null {
  const away = piecesAway(facts);
  if (facts.acceptRule === 'own_check' && away.partner + away.road > 0)
    return 'The parts are not home yet: this order is accepted after your own check.';
  const undecided = facts.lines.find((line) => !decisions.some((one) => one.lineId === line.id));
  if (undecided) return `Decide on ${undecided.title} too.`;
  const silent = decisions.find(({ decision, reason }) => decision !== 'accept' && reason.trim() === '');
  if (silent) return 'Give a reason for everything that is not simply accepted.';
  return null;
}
