import type { Facts, MoveFact, PartFact, RestampFact } from '@/lib/domain/orders/facts';

/** Where the pieces of one part are, as the moves say. */
export interface Whereabouts {
  readonly home: number;
  readonly roadOut: number;
  readonly partner: number;
  readonly roadBack: number;
  /** Stamps checked in and not sent back, in the order they came. */
  readonly stampsThere: readonly string[];
  readonly kitThere: readonly string[];
}

/** Moves that still stand: a corrected one is replaced by the entry that names it. */
export function standingMoves(moves: readonly MoveFact[]): readonly MoveFact[] {
  const replaced = new Set(moves.map((move) => move.replacesId));
  return moves.filter((move) => !replaced.has(move.id));
}

/** Adds the moves of one part up, and the stamps that were put in place of others. */
export function whereabouts(
  part: PartFact,
  { moves, restamps }: Pick<Facts, 'moves' | 'restamps'>,
): Whereabouts {
  const own = standingMoves(moves).filter((move) => move.partId === part.id);
  const sum = (kind: MoveFact['kind']) =>
    own.filter((move) => move.kind === kind).reduce((all, move) => all + move.pieces, 0);
  const [sent, checkedIn, sentBack, received] = [
    sum('sent'),
    sum('checked_in'),
    sum('sent_back'),
    sum('received'),
  ];
  const gone = own.filter((move) => move.kind === 'sent_back').flatMap((move) => move.stamps);
  const came = own.filter((move) => move.kind === 'checked_in').flatMap((move) => move.stamps);
  const stampsThere = restamped(
    came,
    restamps.filter((one) => one.partId === part.id),
  );
  for (const stamp of gone) {
    const at = stampsThere.indexOf(stamp);
    if (at >= 0) stampsThere.splice(at, 1);
  }
  return {
    home: part.pieces - sent + received,
    roadOut: sent - checkedIn,
    partner: checkedIn - sentBack,
    roadBack: sentBack - received,
    stampsThere,
    kitThere:
      checkedIn > sentBack
        ? own.filter((move) => move.kind === 'checked_in').flatMap((move) => move.kit)
        : [],
  };
}

function restamped(stamps: readonly string[], restamps: readonly RestampFact[]): string[] {
  const now = [...stamps];
  for (const { from, to } of restamps) {
    const at = now.indexOf(from);
    if (at >= 0) now[at] = to;
  }
  return now;
}

/**
 * What is wrong with the pieces at the partner, in words; nothing when every piece on the list is there by its
 * stamp. A count alone is never enough.
 */
export function piecesMissing(part: PartFact, there: Whereabouts): string | null {
  if (there.partner < part.pieces) {
    const absent = part.stamps.filter((stamp) => !there.stampsThere.includes(stamp));
    const which = absent.length > 0 && there.partner > 0 ? `, ${absent.join(', ')} missing` : '';
    return `${there.partner} of ${part.pieces} ${part.kind}${which}`;
  }
  const absent = part.stamps.filter((stamp) => !there.stampsThere.includes(stamp));
  if (part.stamps.length === 0 || absent.length === 0) return null;
  const twice = there.stampsThere.filter((stamp, index) => there.stampsThere.indexOf(stamp) !== index);
  const strange = there.stampsThere.filter((stamp) => !part.stamps.includes(stamp));
  const seen = [
    ...twice.map((stamp) => `two are stamped ${stamp}`),
    ...strange.map((stamp) => `one is stamped ${stamp}`),
    ...absent.map((stamp) => `none is ${stamp}`),
  ];
  return `${part.kind}: ${seen.join(', ')}`;
}

/** Pieces not at home, of all parts of the order. */
export function piecesAway(facts: Facts): { partner: number; road: number; out: number; home: number } {
  const all = facts.parts.map((part) => whereabouts(part, facts));
  const sum = (pick: (where: Whereabouts) => number) => all.reduce((total, where) => total + pick(where), 0);
  return {
    partner: sum((where) => where.partner),
    road: sum((where) => where.roadBack),
    out: sum((where) => where.roadOut),
    home: sum((where) => where.home),
  };
}
