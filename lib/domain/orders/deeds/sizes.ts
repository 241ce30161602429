import type { Change } from '@/lib/domain/orders/changes';
import type { CommandOf, KeyedSize, ReleasedLine } from '@/lib/domain/orders/commands';
import { no, type Deeds } from '@/lib/domain/orders/deed';
import type { Facts, SizeFact } from '@/lib/domain/orders/facts';
import { sizesToRepeat } from '@/lib/domain/orders/stand';
import { partnerFigures } from '@/lib/domain/sizes/partner-figures';
import { ok } from '@/lib/domain/result';

/** Releasing a rev and repeating it back. */
export const SIZES_DEEDS: Deeds<'release' | 'repeat_back'> = {
  release: (facts, command) => {
    const wrong = releaseProblem(facts, command);
    if (wrong !== null) return no(wrong);
    const number = (facts.latestRev ?? 0) + 1;
    const changed = command.lines.filter((line) => !standsAlready(facts, line));
    if (changed.length === 0) return no('These sizes stand already.');
    const keptLines = facts.lines.filter(
      (line) =>
        !changed.some((one) => one.lineId === line.id) && facts.sizes.some((size) => size.lineId === line.id),
    );
    const fresh: SizeFact[] = [];
    for (const line of changed) {
      for (const size of sizeFacts(facts, line, number)) {
        if (size === null)
          return no('No whole step of the other shop’s unit lies between these limits. Widen them.');
        fresh.push(size);
      }
    }
    const kept = facts.sizes.filter((size) => keptLines.some((line) => line.id === size.lineId));
    const stops: Change[] = facts.lines
      .filter((line) => line.started && changed.some((one) => one.lineId === line.id))
      .map((line) => ({ row: 'line', lineId: line.id, stopDue: true }));
    const settled: Change[] = facts.snags
      .filter((snag) => snag.state === 'approved' && snag.sizesDue)
      .map((snag) => ({ row: 'snag_set', snagId: snag.id, state: 'approved', sizesDue: false }));
    const rev: Change = {
      row: 'rev',
      number,
      reason: command.reason,
      changed,
      kept: keptLines.map((line) => line.id),
      sizes: [...kept, ...fresh],
    };
    return ok({
      changes: [rev, ...stops, ...settled],
      note: {
        rev: number,
        reason: command.reason,
        stop: stops.length > 0,
        sizes: distinct(fresh).map(sayable),
      },
    });
  },

  repeat_back: (facts, { rev, sizes }) => {
    if (facts.latestRev === null) return no('There are no sizes yet.');
    if (rev !== facts.latestRev)
      return no(`Rev ${facts.latestRev} has replaced rev ${rev}. Look at it first.`);
    const due = sizesToRepeat(facts);
    if (due.length === 0) return no('These sizes have been repeated back already.');
    const answered = due.map((asked) => ({
      asked,
      keyed: sizes.find((size) => size.lineId === asked.lineId && size.what === asked.what),
    }));
    const silent = answered.find(({ keyed }) => !keyed);
    if (silent) return no(`Key in both sizes of ${silent.asked.what}.`);
    const rows = answered.flatMap(({ asked, keyed }) =>
      keyed ? [{ ...keyed, since: asked.since, asked, matches: equals(asked, keyed) }] : [],
    );
    return ok({
      changes: [{ row: 'repeat_back', sizes: rows }],
      note: {
        rev,
        matches: rows.every((row) => row.matches),
        said: rows.map((row) => ({
          what: row.what,
          keyed: [row.lowerText, row.upperText],
          asked: [row.asked.lower, row.asked.upper],
          matches: row.matches,
        })),
      },
    });
  },
};

function releaseProblem(facts: Facts, { lines, reason }: CommandOf<'release'>): string | null {
  if (lines.length === 0) return 'There is nothing to release.';
  const refused = lines.find((line) => line.refused || line.sizes.length === 0);
  if (refused) return 'A sheet is not finished, or refuses its own sizes. Put it right first.';
  const unknown = lines.find((line) => !facts.lines.some((one) => one.id === line.lineId && one.needsSizes));
  if (unknown) return 'That line takes no sizes.';
  if (facts.latestRev !== null && reason.trim() === '')
    return `Say why this replaces rev ${facts.latestRev}.`;
  return null;
}

/** Whether a line's sizes are the ones that stand already: there is nothing to release then. */
export function standsAlready(facts: Facts, line: Pick<ReleasedLine, 'lineId' | 'sizes'>): boolean {
  const own = facts.sizes.filter((size) => size.lineId === line.lineId);
  return (
    own.length === line.sizes.length &&
    line.sizes.every((size) =>
      own.some(
        (old) =>
          old.feature === size.feature &&
          old.what === size.what &&
          old.lower === size.lower &&
          old.upper === size.upper &&
          old.target === size.target,
      ),
    )
  );
}

function sizeFacts(facts: Facts, line: ReleasedLine, since: number): (SizeFact | null)[] {
  const partnerUnit = facts.partner?.unit ?? facts.sender.unit;
  return line.sizes.map((size) => {
    const { feature, what, cutting, target, lower, upper } = size;
    const fact = { lineId: line.lineId, since, feature, what, cutting, target, lower, upper };
    if (partnerUnit === facts.sender.unit) return { ...fact, partner: null };
    const partner = partnerFigures(size, partnerUnit);
    return partner && { ...fact, partner };
  });
}

/** Equal to the limits in the sender's unit, or to the figures released in the partner's. Exactly; nothing is close. */
function equals(asked: SizeFact, keyed: KeyedSize): boolean {
  const same = (limits: { lower: number; upper: number }) =>
    keyed.lower === limits.lower && keyed.upper === limits.upper;
  return same(asked) || (asked.partner !== null && same(asked.partner));
}

function distinct(sizes: readonly SizeFact[]): SizeFact[] {
  return sizes.filter(
    (size, index) =>
      sizes.findIndex(
        (one) =>
          one.lineId === size.lineId &&
          one.what === size.what &&
          one.lower === size.lower &&
          one.upper === size.upper,
      ) === index,
  );
}

function sayable({ what, lower, upper, target }: SizeFact) {
  return { what, lower, upper, target };
}
