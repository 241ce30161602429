import type { Change } from '@/lib/domain/orders/changes';
import type { CommandOf, MovedPart } from '@/lib/domain/orders/commands';
import { no, type Deeds } from '@/lib/domain/orders/deed';
import type { Facts, MoveKind, Side } from '@/lib/domain/orders/facts';
import { piecesMissing, standingMoves, type Whereabouts, whereabouts } from '@/lib/domain/orders/pieces';
import { fail, ok } from '@/lib/domain/result';

/** Who hands over what, and from where. */
const HANDS: Readonly<
  Record<
    MoveKind,
    { side: Side; from: keyof Pick<Whereabouts, 'home' | 'roadOut' | 'partner' | 'roadBack'>; place: string }
  >
> = {
  sent: { side: 'sender', from: 'home', place: 'at home' },
  checked_in: { side: 'partner', from: 'roadOut', place: 'on the road' },
  sent_back: { side: 'partner', from: 'partner', place: 'at the machine shop' },
  received: { side: 'sender', from: 'roadBack', place: 'on the way back' },
};

/** Hand-overs: sent, checked in piece by piece, sent back, received. */
export const PARTS_DEEDS: Deeds<'move_parts' | 'restamp'> = {
  move_parts: (facts, command, { side }) => {
    const { kind, parts, occurredAt } = command;
    if (HANDS[kind].side !== side)
      return fail({ code: 'not_your_move', words: 'This is for the other shop to do.' });
    if (kind === 'sent' && !['sent', 'quoted', 'agreed', 'cutting'].includes(facts.status))
      return no('This order takes no more parts.');
    if (kind === 'sent_back' && ['cutting'].includes(facts.status))
      return no('Report the work first, or cancel the order.');
    if (parts.length === 0) return no('Name at least one part.');
    for (const part of parts) {
      const wrong = moveProblem(facts, kind, part);
      if (wrong !== null) return no(wrong);
    }
    const moves: Change[] = parts.map((part) => ({ row: 'move', kind, part, occurredAt }));
    return ok({
      changes: [...moves, ...holdsFor(facts, command)],
      note: {
        kind,
        occurredAt,
        moveId: parts[0]?.id,
        parts: parts.map(({ partId, pieces, stamps, kit, carrier, condition, replacesId }) => ({
          ...{
            kind: facts.parts.find((part) => part.id === partId)?.kind ?? '',
            pieces,
            stamps,
            kit,
            carrier,
            condition,
          },
          corrects: replacesId !== null,
        })),
      },
    });
  },

  restamp: (facts, { id, partId, from, to, words }) => {
    const part = facts.parts.find((one) => one.id === partId);
    if (!part) return no('That part is not on this order.');
    const stamp = to.trim();
    if (stamp === '' || stamp === from) return no('Give the new stamp.');
    if (!whereabouts(part, facts).stampsThere.includes(from))
      return no(`None of the ${part.kind} here is stamped ${from}.`);
    const restamp: Change = { row: 'restamp', id, partId, from, to: stamp, words };
    const wrong = piecesMissing(
      part,
      whereabouts(part, { ...facts, restamps: [...facts.restamps, { partId, from, to: stamp }] }),
    );
    const settled: Change[] = wrong === null ? liftPartsHolds(facts) : [];
    return ok({
      changes: [restamp, ...settled],
      note: { restampId: id, kind: part.kind, from, to: stamp, words },
    });
  },
};

/** Holds that the machine shop put on because of the pieces. */
function liftPartsHolds(facts: Facts): Change[] {
  return facts.holds
    .filter((hold) => hold.reason === 'parts' && hold.placedBy === 'partner')
    .map((hold) => ({ row: 'hold_set', holdId: hold.id, lifted: true }));
}

function moveProblem(facts: Facts, kind: MoveKind, moved: MovedPart): string | null {
  const part = facts.parts.find((one) => one.id === moved.partId);
  if (!part) return 'That part is not on this order.';
  if (!Number.isSafeInteger(moved.pieces) || moved.pieces < 1) return `Say how many ${part.kind} there are.`;
  if (moved.replacesId !== null && !canCorrect(facts, kind, moved)) {
    return 'A correction names an entry of the same part that still stands.';
  }
  const others = facts.moves.filter((move) => move.id !== moved.replacesId);
  const left = whereabouts(part, { ...facts, moves: others })[HANDS[kind].from];
  if (moved.pieces > left)
    return `Only ${left} of the ${part.kind} ${left === 1 ? 'is' : 'are'} ${HANDS[kind].place}.`;
  if (part.stamps.length > 0 && moved.stamps.length !== moved.pieces)
    return `Give the stamp of each of the ${part.kind}.`;
  return null;
}

function canCorrect(facts: Facts, kind: MoveKind, moved: MovedPart): boolean {
  const replaced = standingMoves(facts.moves).find((move) => move.id === moved.replacesId);
  return replaced?.partId === moved.partId && replaced.kind === kind;
}

/** A check-in that is short or another stamp puts a hold on by itself, for the sender to clear; one that is right lifts it. */
function holdsFor(facts: Facts, { kind, parts }: CommandOf<'move_parts'>): Change[] {
  if (kind !== 'checked_in') return [];
  const moves = [
    ...facts.moves,
    ...parts.map(({ id, partId, pieces, stamps, kit, replacesId }) => ({
      id,
      partId,
      kind,
      pieces,
      stamps,
      kit,
      replacesId,
    })),
  ];
  const wrong = facts.parts.flatMap((part) => {
    const touched = parts.some((moved) => moved.partId === part.id);
    const found = touched ? piecesMissing(part, whereabouts(part, { ...facts, moves })) : null;
    return found === null ? [] : [{ part, found }];
  });
  const lifted = liftPartsHolds(facts);
  const first = parts[0];
  if (wrong.length === 0 || !first) return lifted;
  const words = wrong.map(({ found }) => found).join('; ');
  const hold = {
    id: first.id,
    lineId: null,
    reason: 'parts' as const,
    words,
    waitsFor: 'sender' as const,
    placedBy: 'partner' as const,
  };
  return [...lifted, { row: 'hold', hold }];
}
