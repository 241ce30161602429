import type { Browser } from 'playwright-core';

/** Bytes on the wire of a first view, as the browser's own network log counts them. */
export interface Weight {
  readonly scripts: number;
  readonly all: number;
}

/** Opens an address with an empty cache and weighs everything that came until the page was still. */
export async function weigh(
  browser: Browser,
  origin: string,
  path: string,
  cookies: readonly { name: string; value: string; url: string }[] = [],
): Promise<Weight> {
  const context = await browser.newContext({ baseURL: origin });
  await context.addCookies([...cookies]);
  const page = await context.newPage();
  const session = await context.newCDPSession(page);
  await session.send('Network.enable');
  const scripts = new Set<string>();
  let [script, all] = [0, 0];
  session.on('Network.responseReceived', ({ requestId, type }) => {
    if (type === 'Script') scripts.add(requestId);
  });
  session.on('Network.loadingFinished', ({ requestId, encodedDataLength }) => {
    all += encodedDataLength;
    if (scripts.has(requestId)) script += encodedDataLength;
  });
  await page.goto(path, { waitUntil: 'load' });
  await page.waitForTimeout(1500);
  await context.close();
  return { scripts: script, all };
}
