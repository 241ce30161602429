import { randomUUID } from 'node:crypto';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';
import { movePartAction, restampAction } from '@/app/(workspace)/orders/[orderId]/parts/actions';
import { ChoiceField, TextField } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { PhotoPicker } from '@/components/thread/photo-picker';
import { Notice } from '@/components/ui/notice';
import { loadMoves } from '@/db/read-models/order-parts';
import { now } from '@/lib/adapters/clock';
import type { Facts, MoveKind, PartFact, Side } from '@/lib/domain/orders/facts';
import { piecesMissing, whereabouts } from '@/lib/domain/orders/pieces';
import { sayMoment } from '@/lib/forms/say';

export const metadata = { title: 'Parts' };

const DEEDS: Readonly<Record<MoveKind, { press: string; carrier: string; past: string }>> = {
  sent: { press: 'Send with', carrier: 'Sent with (carrier or person)', past: 'sent' },
  checked_in: { press: 'Check in', carrier: 'Brought by', past: 'checked in' },
  sent_back: { press: 'Send back with', carrier: 'Sent with (carrier or person)', past: 'sent back' },
  received: { press: 'Received and counted', carrier: 'Brought by', past: 'received' },
};

export default async function PartsPage(props: OrderPageProps) {
  const {
    view,
    actor,
    more: moves,
  } = await openOrder(props, (tx, _actor, orderId) => loadMoves(tx, orderId));
  const { facts, side } = view;
  const may = view.allowed.includes('move_parts');
  const kit = [...new Set(facts.lines.flatMap((line) => line.kit))];
  return (
    <OrderFrame view={view} actor={actor} tab="parts">
      <h2 className="mb-3">Parts</h2>
      {facts.parts.map((part) => {
        const next = nextMove(facts, part, side);
        const wrong = view.thread.some((entry) => entry.type === 'order.move_parts')
          ? piecesMissing(part, whereabouts(part, facts))
          : null;
        return (
          <section key={part.id} className="mb-5 border-b border-rule-2 pb-5">
            <h3>
              {part.pieces} {part.kind}
              {part.stamps.length > 0 && (
                <span className="num ml-3 font-normal">stamp {part.stamps.join(' ')}</span>
              )}
            </h3>
            <p className="note mb-3">{sayWhere(part, facts)}</p>
            {wrong !== null && whereabouts(part, facts).partner > 0 && <Notice tone="refuse">{wrong}</Notice>}
            {may && next !== null && (
              <Form
                action={movePartAction}
                requestKey={randomUUID()}
                version={facts.version}
                hidden={{
                  orderId: facts.id,
                  partId: part.id,
                  kind: next.kind,
                  occurredAt: now().toISOString(),
                }}
                className="mt-3 grid max-w-2xl gap-3 sm:grid-cols-2"
                label={`${DEEDS[next.kind].press}: ${part.kind}`}
              >
                <TextField name="pieces" label="Pieces" defaultValue={String(next.pieces)} mono />
                <TextField
                  name="stamps"
                  label="Stamps seen"
                  hint="One a piece, as they stand on the metal."
                  mono
                />
                <TextField name="carrier" label={DEEDS[next.kind].carrier} />
                <TextField
                  name="condition"
                  label="Condition"
                  hint="Undersize already stamped, cast or forged, welded, cracked."
                />
                {next.kind === 'checked_in' && kit.length > 0 && (
                  <ChoiceField
                    kind="checkbox"
                    name="kit"
                    label="What came with it"
                    options={kit.map((item) => ({ value: item, label: item }))}
                    className="sm:col-span-2"
                  />
                )}
                <PhotoPicker orderId={facts.id} label="Add photos" />
                <div>
                  <Submit>{DEEDS[next.kind].press}</Submit>
                </div>
              </Form>
            )}
            {view.allowed.includes('restamp') && whereabouts(part, facts).stampsThere.length > 0 && (
              <Restamp part={part} facts={facts} />
            )}
          </section>
        );
      })}
      <h3 className="mb-2">Hand to hand</h3>
      {moves.length === 0 && <p className="note">Nothing has been handed over yet.</p>}
      <ol>
        {moves.map((move) => (
          <li key={move.id} className="border-b border-rule-2 py-2">
            <span className={move.replaced ? 'line-through' : ''}>
              <b className="font-semibold">{move.shopName}</b> {DEEDS[move.kind].past} {move.pieces}{' '}
              {move.partKind}
              {move.stamps.length > 0 && <span className="num"> {move.stamps.join(' ')}</span>}
              {move.carrier !== '' && ` with ${move.carrier}`}
              {move.condition !== '' && `: ${move.condition}`}
            </span>
            <span className="note block">
              {sayMoment(move.occurredAt, actor.timeZone)}, {move.author}
              {move.replaced && ' · put right by a later entry'}
            </span>
            {may && !move.replaced && handOf(move.kind) === side && (
              <details>
                <summary className="cursor-pointer text-sm text-blue">This entry is wrong</summary>
                <Form
                  action={movePartAction}
                  requestKey={randomUUID()}
                  version={facts.version}
                  hidden={{
                    orderId: facts.id,
                    partId: move.partId,
                    kind: move.kind,
                    replacesId: move.id,
                    carrier: move.carrier,
                    condition: move.condition,
                    occurredAt: move.occurredAt.toISOString(),
                  }}
                  className="mt-2 grid max-w-xl gap-3 sm:grid-cols-2"
                  label="Put the entry right"
                >
                  <TextField name="pieces" label="Pieces" defaultValue={String(move.pieces)} mono />
                  <TextField name="stamps" label="Stamps" defaultValue={move.stamps.join(' ')} mono />
                  <div>
                    <Submit kind="ghost">Put it right</Submit>
                  </div>
                </Form>
              </details>
            )}
          </li>
        ))}
      </ol>
    </OrderFrame>
  );
}

/** A piece that carries a wrong stamp, or none that can be told apart, gets another one here. */
function Restamp({ part, facts }: { part: PartFact; facts: Facts }) {
  return (
    <details className="mt-3">
      <summary className="cursor-pointer text-sm text-blue">Restamp a piece</summary>
      <Form
        action={restampAction}
        requestKey={randomUUID()}
        version={facts.version}
        hidden={{ orderId: facts.id, partId: part.id }}
        className="mt-2 grid max-w-2xl gap-3 sm:grid-cols-2"
        label={`Restamp: ${part.kind}`}
      >
        <TextField name="from" label="Is stamped" mono />
        <TextField name="to" label="Becomes" mono />
        <TextField name="words" label="How one knows" className="sm:col-span-2" />
        <PhotoPicker orderId={facts.id} label="Add photos" />
        <div>
          <Submit kind="ghost">Restamp it</Submit>
        </div>
      </Form>
    </details>
  );
}

function handOf(kind: MoveKind): Side {
  return kind === 'sent' || kind === 'received' ? 'sender' : 'partner';
}

/** The next hand-over of a part that this side can make. */
function nextMove(facts: Facts, part: PartFact, side: Side): { kind: MoveKind; pieces: number } | null {
  const where = whereabouts(part, facts);
  if (side === 'sender') {
    if (where.roadBack > 0) return { kind: 'received', pieces: where.roadBack };
    const canSend = ['sent', 'quoted', 'agreed', 'cutting'].includes(facts.status);
    return canSend && where.home > 0 ? { kind: 'sent', pieces: where.home } : null;
  }
  if (where.roadOut > 0) return { kind: 'checked_in', pieces: where.roadOut };
  return where.partner > 0 && facts.status !== 'cutting' && facts.status !== 'agreed'
    ? { kind: 'sent_back', pieces: where.partner }
    : null;
}

function sayWhere(part: PartFact, facts: Facts): string {
  const where = whereabouts(part, facts);
  const places: [number, string][] = [
    [where.home, `with ${facts.sender.name}`],
    [where.roadOut, 'on the road'],
    [where.partner, `at ${facts.partner?.name ?? 'the machine shop'}`],
    [where.roadBack, 'on the way back'],
  ];
  return places
    .flatMap(([pieces, place]) => (pieces > 0 ? [part.pieces === 1 ? place : `${pieces} ${place}`] : []))
    .join(', ');
}
