import 'server-only';

/** What a mail says: a head line, sentences, and one thing to press. */
export interface Letter {
  readonly subject: string;
  readonly number: number | null;
  readonly headline: string;
  readonly lines: readonly string[];
  readonly press: { readonly label: string; readonly address: string };
}

/** The letter as plain text. */
export function letterText({ headline, lines, press }: Letter): string {
  return [headline, '', ...lines, '', `${press.label}: ${press.address}`, '', 'Wiretag'].join('\n');
}

/** The letter in the look of the tag: manila, an eyelet, the number. No pictures from elsewhere. */
export function letterHtml({ number, headline, lines, press }: Letter): string {
  const body = lines.map((line) => `<p style="margin:0 0 8px">${escape(line)}</p>`).join('');
  const head =
    number === null
      ? ''
      : `<div style="font:800 30px/1 'Courier New',monospace;letter-spacing:1px">WO ${number}</div>`;
  return `<!doctype html><html lang="en"><body style="margin:0;background:#E6E6E0;color:#16202C;font:16px/1.45 Verdana,sans-serif">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0"><tr><td align="center" style="padding:24px 12px">
<table role="presentation" width="560" cellpadding="0" cellspacing="0" style="max-width:560px;background:#F0DDAE;border:1px solid #CDB377">
<tr><td style="padding:22px 26px">
<div style="width:18px;height:18px;border:6px solid #C9A253;border-radius:50%;background:#E6E6E0;margin-bottom:10px"></div>
${head}<h1 style="font-size:20px;margin:6px 0 12px">${escape(headline)}</h1>${body}
<p style="margin:18px 0 4px"><a href="${escape(press.address)}" style="background:#1B3C9E;color:#ffffff;padding:12px 18px;text-decoration:none;border-radius:4px;font-weight:bold">${escape(press.label)}</a></p>
</td></tr></table><p style="font-size:12px;color:#47525F">Wiretag</p></td></tr></table></body></html>`;
}

function escape(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}
