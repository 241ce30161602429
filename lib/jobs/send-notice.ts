import 'server-only';
import { begin, beginUnknown } from '@/db/client';
import { loadOrder, type OrderView, type ThreadEntry } from '@/db/read-models/order-page';
import { closeNotice, type NoticeRow, takeNotice } from '@/db/repositories/notice-letters';
import { now } from '@/lib/adapters/clock';
import { linkAddress, linkSecret } from '@/lib/adapters/links';
import { sendMail } from '@/lib/adapters/mail';
import type { ShopUnit } from '@/lib/domain/actor';
import { sayEvent } from '@/lib/domain/orders/say-event';
import { sayDay } from '@/lib/forms/say';
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

function invitationLetter(notice: NoticeRow): Letter {
  if (notice.kind === 'password.reset') return resetLetter(notice);
  if (notice.kind === 'invitation.order') return firstOrderLetter(notice);
  const { invitingShop = '', shop = '', invitationId = '' } = notice.detail;
  const isPartner = notice.kind === 'invitation.partner';
  return {
    subject: `${invitingShop} invites you to Wiretag`,
    number: null,
    headline: isPartner ? `${invitingShop} sends you work orders here` : `Join ${shop}`,
    lines: [
      isPartner
        ? `${shop} is set up for you: orders with their sizes, prices, readings and messages in one place.`
        : `You are invited into ${shop}.`,
      'The link opens once, within two weeks.',
    ],
    press: {
      label: 'Come in',
      address: linkAddress(`/invitation/${linkSecret('invitation', invitationId)}`),
    },
  };
}

function resetLetter({ detail: { resetId = '' } }: NoticeRow): Letter {
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
      address: linkAddress(`/new-password/${linkSecret('reset', resetId)}`),
    },
  };
}

/** The one e-mail to a machine shop that is not here yet: the order and the way in. */
function firstOrderLetter({ detail }: NoticeRow): Letter {
  const { invitingShop = '', shop = '', invitationId = '', orderId = '', number = '' } = detail;
  const { neededBackOn = '' } = detail;
  const link = `/invitation/${linkSecret('invitation', invitationId)}?order=${orderId}`;
  return {
    subject: `WO ${number} from ${invitingShop}`,
    number: Number(number),
    headline: `${invitingShop} sends you a work order`,
    lines: [
      `Its sizes, parts and messages are on Wiretag, where ${shop} is set up for you already.`,
      ...(neededBackOn === '' ? [] : [`Needed back ${sayDay(neededBackOn, now().getUTCFullYear())}.`]),
      'Give your name and a password, and name your price. The link opens once, within two weeks.',
    ],
    press: { label: 'See the order', address: linkAddress(link) },
  };
}

async function orderLetter(notice: NoticeRow, orderId: string): Promise<Letter | null> {
  if (notice.personId === null) return null;
  return begin({ personId: notice.personId, shopId: notice.shopId }, async (tx, actor) => {
    const view = await loadOrder(tx, actor, orderId);
    return view ? writeOrderLetter(notice, view, actor.unit) : null;
  });
}

function writeOrderLetter(notice: NoticeRow, view: OrderView, unit: ShopUnit): Letter | null {
  const step = view.side === 'sender' ? view.stand.senderStep : view.stand.partnerStep;
  if (notice.step !== null && notice.step !== step) return null;
  const last = lastOf(notice, view);
  if (isTooOld(last)) return null;
  const said = last ? sayEntry(last, unit) : view.title;
  return {
    subject: `WO ${view.facts.number}: ${notice.step ?? (notice.kind === 'order.message' ? 'message' : view.title)}`,
    number: view.facts.number,
    headline: notice.step === null ? view.title : `Your move: ${notice.step}`,
    lines: said === view.title ? [said] : [said, view.title],
    press: { label: 'Open the order', address: linkAddress(`/orders/${view.facts.id}`) },
  };
}

/** The entry that the notice tells of. */
function lastOf({ kind }: NoticeRow, { thread, side }: OrderView): ThreadEntry | undefined {
  const isMessage = kind === 'order.message';
  return thread.findLast(
    (entry) => entry.side !== side && (isMessage ? entry.body !== null : entry.type === kind),
  );
}

function isTooOld(entry: ThreadEntry | undefined): boolean {
  return entry !== undefined && now().getTime() - entry.at.getTime() > TOO_OLD;
}

function sayEntry(entry: ThreadEntry, unit: ShopUnit): string {
  return entry.body ?? `${entry.shopName} ${sayEvent(entry.type, entry.payload, unit)}.`;
}
