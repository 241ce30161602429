import { createServer, type Server } from 'node:http';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

/** A mail that has come in. */
export interface ReceivedMail {
  readonly id: number;
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly messageId: string;
  readonly at: string;
}

/** Where mails go on this machine: an SMTP server that keeps them, and a page that shows them. */
export interface Mailbox {
  readonly mails: readonly ReceivedMail[];
  readonly close: () => Promise<void>;
}

/** Starts the SMTP server and the page on loopback. */
export async function startMailbox({
  smtpPort,
  pagePort,
}: {
  smtpPort: number;
  pagePort: number;
}): Promise<Mailbox> {
  const mails: ReceivedMail[] = [];
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    onData: (stream, session, done) => {
      simpleParser(stream).then(
        (mail) => {
          const to = session.envelope.rcptTo.map(({ address }) => address);
          mails.push({
            ...{ id: mails.length + 1, to, subject: mail.subject ?? '', text: mail.text ?? '' },
            ...{
              html: typeof mail.html === 'string' ? mail.html : '',
              messageId: mail.messageId ?? '',
              at: new Date().toISOString(),
            },
          });
          done();
        },
        (error: unknown) => done(error instanceof Error ? error : new Error('unreadable')),
      );
    },
  });
  await new Promise<void>((resolve) => smtp.listen(smtpPort, '127.0.0.1', resolve));
  const page = createServer((request, response) => {
    const path = new URL(request.url ?? '/', 'http://mailbox').pathname;
    response.setHeader('cache-control', 'no-store');
    if (path === '/mails.json') {
      response.setHeader('content-type', 'application/json; charset=utf-8');
      response.end(JSON.stringify(mails));
      return;
    }
    const mail = mails.find(({ id }) => path === `/mails/${id}`);
    response.setHeader('content-type', 'text/html; charset=utf-8');
    response.end(mail ? mail.html : listPage(mails));
  });
  await listen(page, pagePort);
  return {
    mails,
    close: async () => {
      await new Promise<void>((resolve) => smtp.close(resolve));
      await new Promise<void>((resolve) => page.close(() => resolve()));
    },
  };
}

function listen(server: Server, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', resolve);
  });
}

function listPage(mails: readonly ReceivedMail[]): string {
  const rows = mails
    .toReversed()
    .map(
      (mail) =>
        `<tr><td>${escape(mail.to.join(', '))}</td><td><a href="/mails/${mail.id}">${escape(mail.subject)}</a></td><td>${mail.at.slice(11, 19)}</td></tr>`,
    )
    .join('');
  return `<!doctype html><html lang="en"><meta charset="utf-8"><meta http-equiv="refresh" content="5"><title>Mailbox</title>
<body style="font:16px/1.5 sans-serif;max-width:900px;margin:2rem auto;background:#E6E6E0;color:#16202C"><h1>Mailbox</h1>
<p>Every mail that the shops on this machine are sent.</p><table cellpadding="6" style="background:#FCFBF7;width:100%">
<tr><th align="left">To</th><th align="left">Subject</th><th align="left">At</th></tr>${rows || '<tr><td colspan="3">No mail yet.</td></tr>'}</table></body></html>`;
}

function escape(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');
}
