import 'server-only';
import nodemailer from 'nodemailer';
import { settings } from '@/lib/config/env';

/** A mail as it is handed over. */
export interface Mail {
  readonly to: { readonly name: string; readonly address: string };
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  /** Fixed by what it tells of: sent twice, a mailbox shows it once. */
  readonly messageId: string;
}

/** One mailbox and nothing else: no quotes, commas, spaces or line breaks that could name another. */
const ADDRESS = /^[^\s"'(),:;<>@[\\\]]+@[^\s"'(),:;<>@[\\\]]+$/;

/** Sends a mail. @throws Error when the address is not one plain mailbox, or the mail server refuses or is away. */
export async function sendMail(mail: Mail): Promise<void> {
  if (!ADDRESS.test(mail.to.address)) throw new Error('Not one plain mail address');
  const { SMTP_URL, MAIL_FROM } = settings();
  const transport = nodemailer.createTransport(SMTP_URL);
  await transport.sendMail({
    from: MAIL_FROM,
    to: { name: mail.to.name.replaceAll(/[\r\n]/g, ' '), address: mail.to.address },
    subject: mail.subject.replaceAll(/[\r\n]/g, ' '),
    ...{ text: mail.text, html: mail.html, messageId: mail.messageId },
    headers: { 'Auto-Submitted': 'auto-generated' },
  });
}
