import { randomUUID } from 'node:crypto';
import { openOrder, type OrderPageProps } from '@/app/(workspace)/orders/_components/load';
import { OrderFrame } from '@/app/(workspace)/orders/_components/order-frame';
import { startLineAction } from '@/app/(workspace)/orders/[orderId]/actions';
import { decideAction, reportAction } from '@/app/(workspace)/orders/[orderId]/readings/actions';
import { SelectField, TextArea } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { ReadingsEntry } from '@/components/readings/entry';
import { PartMap } from '@/components/readings/part-map';
import { ReadingsTable } from '@/components/readings/readings-table';
import type { OrderView } from '@/db/read-models/order-page';
import { loadReadings, type DecisionView, type ReadingView } from '@/db/read-models/order-readings';
import { type Actor, can } from '@/lib/domain/actor';
import { operationByKey } from '@/lib/domain/operations/catalogue';
import { unreadPlaces } from '@/lib/domain/orders/deeds/cutting';
import type { LineFact } from '@/lib/domain/orders/facts';
import { whyNotClear } from '@/lib/domain/orders/stand';

export const metadata = { title: 'Readings' };

const DECISIONS = {
  accept: 'accepted',
  as_is: 'accepted as is',
  send_back: 'sent back',
  reject: 'rejected',
} as const;

export default async function ReadingsPage(props: OrderPageProps) {
  const { view, actor, more } = await openOrder(props, (tx, _actor, orderId) => loadReadings(tx, orderId));
  const { facts, allowed } = view;
  const isCut = facts.moves.some((move) => move.kind === 'checked_in');
  return (
    <OrderFrame view={view} actor={actor} tab="readings">
      {facts.lines.map((line) => (
        <LineSection
          key={line.id}
          line={line}
          view={view}
          actor={actor}
          readings={more?.readings ?? []}
          decisions={more?.decisions ?? []}
          isCut={isCut}
        />
      ))}
      {allowed.includes('report') && <Report view={view} />}
      {allowed.includes('decide') && <Decide view={view} />}
    </OrderFrame>
  );
}

interface LineSectionProps {
  line: LineFact;
  view: OrderView;
  actor: Actor;
  readings: readonly ReadingView[];
  decisions: readonly DecisionView[];
  isCut: boolean;
}

function LineSection({ line, view, actor, readings, decisions, isCut }: LineSectionProps) {
  const { facts, side, allowed } = view;
  const sizes = facts.sizes.filter((size) => size.lineId === line.id);
  const own = readings.filter(
    (reading) => reading.lineId === line.id && reading.round === facts.round && reading.stage !== 'found',
  );
  const why = whyNotClear(facts, line);
  const said = decisions.filter((decision) => decision.lineId === line.id);
  const mayRead =
    isCut &&
    can(actor, 'readings') &&
    sizes.length > 0 &&
    !['closed', 'declined', 'withdrawn'].includes(facts.status);
  return (
    <section className="mb-6 border-b border-rule-2 pb-6">
      <h2>{line.title}</h2>
      <p className="note mb-3">
        {line.started ? 'On the machine or done. ' : ''}
        {sizes.length > 0 ? `Rev ${facts.latestRev}. ` : ''}
        {['agreed', 'cutting'].includes(facts.status) &&
          (why === null ? 'Clear to cut.' : `Not clear to cut. ${why}`)}
        {facts.round > 1 && ` Round ${facts.round}.`}
      </p>
      {said.map((decision) => (
        <p key={decision.round} className="mb-2 text-[15px]">
          Round {decision.round}: <b className="font-semibold">{DECISIONS[decision.decision]}</b> by{' '}
          {decision.author}
          {decision.features.length > 0 && <span className="num"> ({decision.features.join(', ')})</span>}
          {decision.reason === '' ? '' : `: ${decision.reason}`}
        </p>
      ))}
      {allowed.includes('start') && !line.started && why === null && (
        <Form
          action={startLineAction}
          requestKey={randomUUID()}
          version={facts.version}
          hidden={{ orderId: facts.id, lineId: line.id }}
          className="mb-3"
          label={`Put it on the machine: ${line.title}`}
        >
          <Submit>Put it on the machine</Submit>
        </Form>
      )}
      {sizes.length > 0 && view.made && (
        <PartMap made={view.made} operation={line.operation} sizes={sizes} readings={own} />
      )}
      {sizes.length > 0 && <ReadingsTable sizes={sizes} readings={own} unit={facts.sender.unit} />}
      {mayRead && (
        <ReadingsEntry
          orderId={facts.id}
          lineId={line.id}
          unit={actor.unit}
          features={sizes.map(({ feature, what, cutting, lower, upper }) => ({
            feature,
            what,
            cutting,
            lower,
            upper,
          }))}
          positions={operationByKey(line.operation).positions}
          stages={side === 'partner' ? PARTNER_STAGES : SENDER_STAGES}
        />
      )}
    </section>
  );
}

const PARTNER_STAGES = [
  { value: 'finished', label: 'Finished' },
  { value: 'cut', label: 'Ground or bored, before polish or hone' },
  { value: 'found', label: 'As found' },
] as const;
const SENDER_STAGES = [{ value: 'finished', label: 'Finished, our own check' }] as const;

function Report({ view: { facts } }: { view: OrderView }) {
  const missing = facts.lines
    .map((line) => ({ line, count: unreadPlaces(facts, line.id, line.required).length }))
    .filter(({ count }) => count > 0);
  return (
    <Form
      action={reportAction}
      requestKey={randomUUID()}
      version={facts.version}
      hidden={{ orderId: facts.id }}
      className="grid max-w-xl gap-3"
      label="Report it finished"
    >
      <h2>Report it finished</h2>
      {missing.map(({ line, count }) => (
        <TextArea
          key={line.id}
          name={`unread:${line.id}`}
          label={`${line.title}: ${count} places are not read. Why?`}
        />
      ))}
      <div>
        <Submit>Report it finished</Submit>
      </div>
    </Form>
  );
}

const CHOICES = [
  { value: '', label: 'Decide' },
  { value: 'accept', label: 'Accept' },
  { value: 'as_is', label: 'Accept as is' },
  { value: 'send_back', label: 'Send back' },
  { value: 'reject', label: 'Reject' },
];

function Decide({ view: { facts } }: { view: OrderView }) {
  return (
    <Form
      action={decideAction}
      requestKey={randomUUID()}
      version={facts.version}
      hidden={{ orderId: facts.id }}
      className="grid gap-4"
      label="Check and decide"
    >
      <h2>Check and decide</h2>
      {facts.lines.map((line) => (
        <div key={line.id} className="grid gap-3 sm:grid-cols-2">
          <SelectField name={`decision:${line.id}`} label={line.title} options={CHOICES} />
          <TextArea
            name={`reason:${line.id}`}
            label="Reason"
            hint="What is wrong or what comes next; not needed to accept."
          />
          <FeatureBoxes line={line} facts={facts} />
        </div>
      ))}
      <div>
        <Submit>Decide</Submit>
      </div>
    </Form>
  );
}

/** Which journals, cylinders or pieces a decision is about. */
function FeatureBoxes({ line, facts }: { line: LineFact; facts: OrderView['facts'] }) {
  const sized = facts.sizes.filter((size) => size.lineId === line.id).map(({ feature }) => feature);
  const stamped = facts.parts
    .filter((part) => line.partIds.includes(part.id) && part.pieces > 1)
    .flatMap(({ stamps }) => stamps);
  const features = [...new Set(sized.length > 0 ? sized : stamped)];
  if (features.length < 2) return null;
  return (
    <fieldset className="sm:col-span-2">
      <legend className="note mb-1">Only some of it? Tick which; none ticked means all.</legend>
      <div className="flex flex-wrap gap-2">
        {features.map((feature) => (
          <label
            key={feature}
            className="flex min-h-11 min-w-14 cursor-pointer items-center gap-2 rounded border border-rule px-3 has-checked:border-blue has-checked:bg-blue-wash"
          >
            <input
              type="checkbox"
              name={`feature:${line.id}:${feature}`}
              value="on"
              className="size-5 accent-[var(--blue)]"
            />
            <span className="num">{feature}</span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
