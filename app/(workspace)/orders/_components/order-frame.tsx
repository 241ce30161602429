import { randomUUID } from 'node:crypto';
import type { ReactNode } from 'react';
import { OrderDeeds } from '@/app/(workspace)/orders/_components/order-deeds';
import { writeMessageAction } from '@/app/(workspace)/orders/[orderId]/actions';
import { LiveRefresh } from '@/components/live/live-refresh';
import { Tag } from '@/components/tag/tag';
import { Composer } from '@/components/thread/composer';
import { SeenMark } from '@/components/thread/seen-mark';
import { Thread } from '@/components/thread/thread';
import type { OrderView } from '@/db/read-models/order-page';
import { type Actor, can } from '@/lib/domain/actor';
import { quietNote } from '@/lib/domain/sizes/message-sizes';
import { sayPunches, sayVerdict, tabOf } from '@/lib/forms/order-words';
import { sayDay } from '@/lib/forms/say';

const TABS = ['sizes', 'readings', 'parts', 'price', 'papers', 'history'] as const;

interface OrderFrameProps {
  view: OrderView;
  actor: Actor;
  tab: (typeof TABS)[number];
  children: ReactNode;
  /** While somebody repeats the sizes back, nothing on the page may show them. */
  hidesSizes?: boolean;
}

/** An order's page around one of its tabs: the tag, what is to be done now, the tabs, the messages. */
export function OrderFrame({ view, actor, tab, children, hidesSizes = false }: OrderFrameProps) {
  const { facts, side, stand } = view;
  const step = side === 'sender' ? stand.senderStep : stand.partnerStep;
  const other = side === 'sender' ? facts.partner : facts.sender;
  const thread = view.thread.map((entry) => ({
    ...entry,
    payload: hidesSizes ? withoutSizes(entry.payload) : entry.payload,
    quietNote:
      entry.body === null || hidesSizes
        ? undefined
        : quietNote(entry.body, facts.sizes, facts.latestRev, facts.sender.unit),
  }));
  return (
    <main className="page">
      <LiveRefresh orderId={facts.id} />
      <SeenMark orderId={facts.id} last={view.thread.at(-1)?.seq ?? 0} seen={view.seenSeq} />
      <Tag
        number={facts.number}
        title={view.title}
        facts={tagFacts(view)}
        punches={stand.punches}
        stopped={stand.stopped}
        says={sayPunches({ ...facts, punches: stand.punches }, view.agreedMinor)}
        verdict={sayVerdict(facts, stand, side)}
      />
      {step !== null && facts.status !== 'draft' && (
        <p className="mt-4 flex flex-wrap items-center gap-3 border border-manila-edge bg-manila-2 px-4 py-2.5">
          <b className="font-semibold">Your move: {step}</b>
          {tabOf(step) !== tab && (
            <a href={`/orders/${facts.id}/${tabOf(step)}`} className="btn ml-auto">
              Take it up
            </a>
          )}
        </p>
      )}
      <div className="mt-5 grid items-start gap-6 lg:grid-cols-[minmax(0,1fr)_372px]">
        <div className="sheet min-w-0">
          <nav aria-label="Order" className="flex gap-1 overflow-x-auto border-b border-rule px-3">
            {TABS.map((name) => (
              <a
                key={name}
                href={`/orders/${facts.id}/${name}`}
                aria-current={name === tab ? 'page' : undefined}
                className="border-b-[3px] border-transparent px-3.5 pt-3 pb-2.5 text-[15px] text-ink-2 capitalize aria-[current]:border-blue aria-[current]:font-semibold aria-[current]:text-ink"
              >
                {name}
              </a>
            ))}
          </nav>
          <div className="px-5 py-5">{children}</div>
        </div>
        <div className="grid gap-5">
          {facts.status !== 'draft' && other !== null && (
            <Thread
              entries={thread}
              seenSeq={view.seenSeq}
              side={side}
              unit={actor.unit}
              timeZone={actor.timeZone}
            >
              {can(actor, 'message') && (
                <Composer
                  action={writeMessageAction}
                  orderId={facts.id}
                  to={other.name}
                  firstKey={randomUUID()}
                />
              )}
            </Thread>
          )}
          <OrderDeeds view={view} />
        </div>
      </div>
    </main>
  );
}

function tagFacts({ facts, engine, buildNumber, reference }: OrderView): { label: string; value: string }[] {
  const year = new Date().getUTCFullYear();
  const rows: [string, string | null][] = [
    ['From', facts.sender.name],
    ['To', facts.partner?.name ?? null],
    ['Build', [buildNumber === null ? '' : `B-${buildNumber}`, engine].filter(Boolean).join(' · ') || null],
    ['Needed back', facts.neededBackOn && sayDay(facts.neededBackOn, year)],
    [
      'Promised',
      facts.promisedOn
        ? sayDay(facts.promisedOn, year)
        : facts.promiseDays
          ? `${facts.promiseDays} working days from clear`
          : null,
    ],
    ['Our reference', reference || null],
  ];
  return rows.flatMap(([label, value]) => (value === null ? [] : [{ label, value }]));
}

function withoutSizes(payload: Readonly<Record<string, unknown>>): Readonly<Record<string, unknown>> {
  return Object.fromEntries(Object.entries(payload).filter(([name]) => name !== 'sizes' && name !== 'said'));
}
