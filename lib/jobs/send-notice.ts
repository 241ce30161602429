import 'server-only';
import { begin, beginUnknown } from '@/db/client';
import { loadOrder } from '@/db/read-models/order-page';
import { closeNotice, type NoticeRow, takeNotice } from '@/db/repositories/notice-letters';
import { now } from '@/lib/adapters/clock';
import { linkAddress, linkSecret } from '@/lib/adapters/links';
import { sendMail } from '@/lib/adapters/mail';
import { sayEvent } from '@/lib/domain/orders/say-event';
import { type Letter, letterHtml, letterText } from '@/lib/jobs/letters';

/**
 * Sends the mail of one notice, written with what its reader may see. One that is sent already is not sent again; a step
 * that is gone is not told any more. A failure is thrown, and the task comes again later.
 */
export async function sendNotice(noticeId: string): Promise<void> {
  const notice = await beginUnknown((tx) => takeNotice(tx, noticeId));
  if (!notice) return;
  const letter =
    notice.orderId === null ? invitationLetter(notice) : await orderLetter(notice, notice.orderId);
  if (letter === null) {
    await beginUnknown((tx) => closeNotice(tx, noticeId, 'dropped', 'the step is gone'));
    return;
  }
  await sendMail({
    to: { name: notice.name, address: notice.email },
    subject: letter.subject,
    text: letterText(letter),
    html: letterHtml(letter),
    messageId: `<${notice.id}@wiretag>`,
  });
  await beginUnknown((tx) => closeNotice(tx, noticeId, 'sent'));
}

/** After three days a mail tells nobody anything new; the bench does. */
const TOO_OLD = 3 * 24 * 3600 * 1000;

function invitationLetter({ kind, detail }: NoticeRow): Letter | null {
  if (kind === 'password.reset') {
    return {
      subject: 'Set a new password',
      number: null,
      headline: 'Set a new password',
      lines: [
        'Somebody, probably you, asked for a new password. The link opens once, within one hour.',
        'If it was not you, leave this mail alone.',
      ],
      press: {
        label: 'Set a new password',
        address: linkAddress(`/new-password/${linkSecret('reset', detail['resetId'] ?? '')}`),
      },
    };
  }
  const isPartner = kind === 'invitation.partner';
  return {
    subject: `${detail['invitingShop'] ?? ''} invites you to Wiretag`,
    number: null,
    headline: isPartner
      ? `${detail['invitingShop'] ?? ''} sends you work orders here`
      : `Join ${detail['shop'] ?? ''}`,
    lines: [
      isPartner
        ? `${detail['shop'] ?? ''} is set up for you: orders with their sizes, prices, readings and messages in one place.`
        : `You are invited into ${detail['shop'] ?? ''}.`,
      'The link opens once, within two weeks.',
    ],
    press: {
      label: 'Come in',
      address: linkAddress(`/invitation/${linkSecret('invitation', detail['invitationId'] ?? '')}`),
    },
  };
}

async function orderLetter(notice: NoticeRow, orderId: string): Promise<Letter | null> {
  if (notice.personId === null) return null;
  return begin({ personId: notice.personId, shopId: notice.shopId }, async (tx, actor) => {
    const view = await loadOrder(tx, actor, orderId);
    if (!view) return null;
    const step = view.side === 'sender' ? view.stand.senderStep : view.stand.partnerStep;
    if (notice.step !== null && notice.step !== step) return null;
    const isMessage = notice.kind === 'order.message';
    const last = view.thread.findLast(
      (entry) => entry.side !== view.side && (isMessage ? entry.body !== null : entry.type === notice.kind),
    );
    if (last && now().getTime() - last.at.getTime() > TOO_OLD) return null;
    const said = last
      ? (last.body ?? `${last.shopName} ${sayEvent(last.type, last.payload, actor.unit)}.`)
      : '';
    return {
      subject: `WO ${view.facts.number}: ${notice.step ?? (isMessage ? `message from ${last?.shopName ?? ''}` : view.title)}`,
      number: view.facts.number,
      headline: notice.step === null ? view.title : `Your move: ${notice.step}`,
      lines: [said, view.title].filter((line) => line !== ''),
      press: { label: 'Open the order', address: linkAddress(`/orders/${orderId}`) },
    };
  });
}
