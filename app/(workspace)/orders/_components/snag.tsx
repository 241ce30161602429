import { randomUUID } from 'node:crypto';
import { answerSnagAction } from '@/app/(workspace)/orders/[orderId]/actions';
import { TextArea } from '@/components/forms/fields';
import { Form, Submit } from '@/components/forms/form';
import { Sheet } from '@/components/ui/sheet';
import type { OrderView } from '@/db/read-models/order-page';
import type { SnagFact } from '@/lib/domain/orders/facts';
import { sayProposal } from '@/lib/domain/orders/say-event';

/** An open snag: what was met and proposed, and what this person can answer now. */
export function Snag({ snag, view }: { snag: SnagFact; view: OrderView }) {
  const { facts, allowed } = view;
  const raised = view.thread.find(
    ({ type, payload }) => type === 'order.raise_snag' && payload['snagId'] === snag.id,
  );
  const decides = snag.state !== 'approved' && allowed.includes('approve_snag');
  const replies = snag.state === 'asked' && allowed.includes('reply_snag');
  return (
    <Sheet title="Snag">
      {raised && <p className="mb-3">{sayProposal(raised.payload)}</p>}
      {snag.state === 'approved' && <p className="note">Approved. The new sizes are still to come.</p>}
      {snag.state === 'raised' && !decides && <p className="note">It waits for {facts.sender.name}.</p>}
      {(decides || replies) && (
        <Form
          action={answerSnagAction}
          requestKey={randomUUID()}
          version={facts.version}
          hidden={{ orderId: facts.id, snagId: snag.id }}
          className="grid gap-3"
          label="Answer the snag"
        >
          <TextArea name="words" label={replies ? 'Your answer' : 'What you want to say'} />
          {decides && (
            <div className="flex flex-wrap gap-2">
              <Submit name="answer" value="approve">
                Approve
              </Submit>
              <Submit name="answer" value="approve_sizes">
                Approve, new sizes follow
              </Submit>
              <Submit kind="ghost" name="answer" value="ask">
                Ask
              </Submit>
              <Submit kind="stop" name="answer" value="carry_on">
                Decline, carry on
              </Submit>
              <Submit kind="stop" name="answer" value="stop">
                Decline, stop
              </Submit>
            </div>
          )}
          {replies && (
            <Submit name="answer" value="reply">
              Answer
            </Submit>
          )}
        </Form>
      )}
    </Sheet>
  );
}
