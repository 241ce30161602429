import 'server-only';
import type { Tx } from '@/db/client';
import type { Actor } from '@/lib/domain/actor';
import type { Change, OrderSet } from '@/lib/domain/orders/changes';
import type { Facts } from '@/lib/domain/orders/facts';

/** Who writes, where and when: on every row a command leaves. */
export interface Writing {
  readonly tx: Tx;
  readonly actor: Actor;
  readonly orderId: string;
  readonly round: number;
  readonly unit: Facts['sender']['unit'];
  readonly currency: string;
  readonly now: string;
  readonly newId: () => string;
}

type Writers = {
  readonly [R in Exclude<Change['row'], 'order'>]: (
    writing: Writing,
    change: Extract<Change, { row: R }>,
  ) => Promise<unknown>;
};

/** Writes the rows of a decided command. The order's own columns are collected and written once, at the end. */
export async function writeChanges(writing: Writing, changes: readonly Change[]): Promise<OrderSet> {
  let set: OrderSet = {};
  for (const change of changes) {
    if (change.row === 'order') set = { ...set, ...change.set };
    else
      await (WRITERS[change.row] as (writing: Writing, change: Change) => Promise<unknown>)(writing, change);
  }
  return set;
}

function author({ actor, orderId, now }: Writing) {
  return {
    order_id: orderId,
    shop_id: actor.shopId,
    person_id: actor.personId,
    author_name: actor.personName,
    at: now,
  };
}

const WRITERS: Writers = {
  line: ({ tx, now }, { lineId, started, stopDue }) =>
    tx('order_lines')
      .where({ id: lineId })
      .update({
        ...(started ? { started_at: now } : {}),
        ...(stopDue === undefined ? {} : { stop_due: stopDue }),
      }),

  quote: async (writing, quote) => {
    await writing.tx('quotes').insert({
      ...author(writing),
      ...{ revision: quote.revision, kind: quote.kind, currency: writing.currency, note: quote.note },
      extras: JSON.stringify(quote.extras),
      extras_minor: quote.extras.reduce((all, extra) => all + extra.amountMinor, 0),
      ...{ tax_minor: quote.taxMinor, total_minor: quote.totalMinor, promised_on: quote.promisedOn },
      ...{ promise_days: quote.promiseDays, valid_until: quote.validUntil },
    });
    if (quote.lines.length === 0) return;
    await writing.tx('quote_lines').insert(
      quote.lines.map(({ lineId, amountMinor }) => ({
        ...{
          order_id: writing.orderId,
          revision: quote.revision,
          line_id: lineId,
          amount_minor: amountMinor,
        },
      })),
    );
  },

  quote_answer: (writing, { revision, kind, answer, note }) =>
    writing
      .tx('quote_answers')
      .insert({ id: writing.newId(), ...author(writing), revision, kind, answer, note }),

  rev: async (writing, rev) => {
    const { tx, orderId } = writing;
    const { at, ...by } = author(writing);
    await tx('revs').insert({
      ...by,
      released_at: at,
      number: rev.number,
      unit: writing.unit,
      reason: rev.reason,
    });
    await tx('rev_lines').insert(
      rev.changed.map((line) => ({
        ...{
          order_id: orderId,
          rev: rev.number,
          line_id: line.lineId,
          since: rev.number,
          source: line.source,
        },
        ...{ catalogue_version: line.catalogueVersion, typed_reason: line.typedReason },
        ...{
          inputs: JSON.stringify(line.inputs),
          steps: JSON.stringify(line.steps),
          checks: JSON.stringify(line.checks),
        },
      })),
    );
    if (rev.kept.length > 0) {
      await tx.raw(
        `insert into rev_lines (order_id, rev, line_id, since, source, catalogue_version, inputs, steps, checks, typed_reason)
         select order_id, ?, line_id, since, source, catalogue_version, inputs, steps, checks, typed_reason
         from rev_lines where order_id = ? and rev = ? and line_id = any (?)`,
        [rev.number, orderId, rev.number - 1, [...rev.kept]],
      );
    }
    await tx('rev_sizes').insert(
      rev.sizes.map((size, position) => ({
        ...{
          order_id: orderId,
          rev: rev.number,
          line_id: size.lineId,
          feature: size.feature,
          what: size.what,
          position,
        },
        ...{ cutting: size.cutting, target_nm: size.target, lower_nm: size.lower, upper_nm: size.upper },
        ...{ derived_nm: derivedOf(rev.changed, size.lineId, size.feature, size.what) },
        ...{ partner_target_nm: size.partner?.target ?? null, partner_lower_nm: size.partner?.lower ?? null },
        partner_upper_nm: size.partner?.upper ?? null,
      })),
    );
  },

  repeat_back: (writing, { sizes }) =>
    writing.tx('repeat_backs').insert(
      sizes.map((size) => ({
        ...author(writing),
        ...{
          id: size.id,
          since: size.since,
          line_id: size.lineId,
          what: size.what,
          unit: size.unit,
          matches: size.matches,
        },
        ...{
          lower_nm: size.asked.lower,
          upper_nm: size.asked.upper,
          keyed_lower_nm: size.lower,
          keyed_upper_nm: size.upper,
        },
        ...{ keyed_lower_text: size.lowerText, keyed_upper_text: size.upperText },
      })),
    ),

  move: (writing, { kind, part, occurredAt }) => {
    const { at: _at, ...by } = author(writing);
    return writing.tx('custody_moves').insert({
      ...by,
      ...{ id: part.id, part_id: part.partId, kind, pieces: part.pieces, stamps: part.stamps, kit: part.kit },
      ...{
        carrier: part.carrier,
        condition: part.condition,
        replaces_id: part.replacesId,
        occurred_at: occurredAt,
      },
    });
  },

  restamp: (writing, { id, partId, from, to, words }) =>
    writing
      .tx('restamps')
      .insert({ ...author(writing), id, part_id: partId, from_stamp: from, to_stamp: to, words }),

  hold: (writing, { hold }) => {
    const { at, ...by } = author(writing);
    return writing.tx('holds').insert({
      ...by,
      ...{ id: hold.id, line_id: hold.lineId, reason: hold.reason, words: hold.words, placed_at: at },
      ...{ waits_for: hold.waitsFor, placed_by: hold.placedBy },
    });
  },

  hold_set: ({ tx, now }, { holdId, waitsFor, lifted }) =>
    tx('holds')
      .where({ id: holdId })
      .update({
        ...(waitsFor ? { waits_for: waitsFor, answered_at: now } : {}),
        ...(lifted ? { lifted_at: now } : {}),
      }),

  snag: (writing, { snag, kind, words, proposal }) =>
    writing.tx('snags').insert({
      ...author(writing),
      ...{ id: snag.id, line_id: snag.lineId, round: writing.round, kind, words, proposal },
      ...{ price_minor: snag.priceMinor, days: snag.days, state: snag.state, sizes_due: snag.sizesDue },
    }),

  snag_set: ({ tx }, { snagId, state, sizesDue }) =>
    tx('snags')
      .where({ id: snagId })
      .update({ state, sizes_due: sizesDue, version: tx.raw('version + 1') }),

  snag_answer: (writing, { snagId, answer, words }) =>
    writing
      .tx('snag_answers')
      .insert({ id: writing.newId(), ...author(writing), snag_id: snagId, answer, words }),

  decision: (writing, { lineId, decision, reason, features }) =>
    writing
      .tx('line_decisions')
      .insert({ ...author(writing), line_id: lineId, round: writing.round, decision, reason, features }),
};

function derivedOf(
  lines: Extract<Change, { row: 'rev' }>['changed'],
  lineId: string,
  feature: string,
  what: string,
): number | null {
  const line = lines.find((one) => one.lineId === lineId);
  return line?.sizes.find((size) => size.feature === feature && size.what === what)?.derived ?? null;
}
