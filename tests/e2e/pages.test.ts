import { readdirSync } from 'node:fs';
import path from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { DEMO_PASSWORD } from '@/lib/demo/sign-ins';
import { demoId } from '@/lib/demo/cast';
import {
  axeViolations,
  DESKTOP,
  launchBrowser,
  PHONE,
  type Seat,
  signIn,
  takeSeat,
} from '../support/browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser.close();
});

const ORDER = demoId('order being cut');
const DRAFT = demoId('order a draft');
const BUILD = demoId('build six');

const OURS: readonly Asker[] = ['sender', 'bench', 'counter'];
const PARTIES: readonly Asker[] = [...OURS, 'partner', 'partnerBench', 'partnerCounter'];
const SIGNED_IN: readonly Asker[] = [...PARTIES, 'otherPartner'];
const ANYBODY: readonly Asker[] = [...SIGNED_IN, 'nobody'];
const OWNERS: readonly Asker[] = ['sender', 'partner', 'otherPartner'];

/** Every page of the product with an address that shows it, and who may: anything not listed here fails. */
const PAGES: Readonly<Record<string, { readonly at: string; readonly opens: readonly Asker[] }>> = {
  'page.tsx': { at: '/', opens: SIGNED_IN },
  '(public)/sign-in/page.tsx': {
    at: '/sign-in',
    opens: ANYBODY,
  },
  '(public)/new-shop/page.tsx': {
    at: '/new-shop',
    opens: ANYBODY,
  },
  '(public)/new-password/page.tsx': {
    at: '/new-password',
    opens: ANYBODY,
  },
  '(public)/new-password/[secret]/page.tsx': {
    at: '/new-password/none-of-that-kind-here',
    opens: ANYBODY,
  },
  '(public)/invitation/[secret]/page.tsx': {
    at: '/invitation/none-of-that-kind-here',
    opens: ANYBODY,
  },
  '(workspace)/bench/page.tsx': { at: '/bench', opens: SIGNED_IN },
  '(workspace)/builds/page.tsx': { at: '/builds', opens: SIGNED_IN },
  '(workspace)/builds/new/page.tsx': {
    at: '/builds/new',
    opens: SIGNED_IN,
  },
  '(workspace)/builds/[buildId]/page.tsx': { at: `/builds/${BUILD}`, opens: OURS },
  '(workspace)/orders/page.tsx': {
    at: '/orders?show=all',
    opens: SIGNED_IN,
  },
  '(workspace)/orders/new/page.tsx': {
    at: '/orders/new',
    opens: SIGNED_IN,
  },
  '(workspace)/orders/[orderId]/edit/page.tsx': {
    at: `/orders/${DRAFT}/edit`,
    opens: OURS,
  },
  '(workspace)/orders/[orderId]/page.tsx': {
    at: `/orders/${ORDER}`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/sizes/page.tsx': {
    at: `/orders/${ORDER}/sizes`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/readings/page.tsx': {
    at: `/orders/${ORDER}/readings`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/parts/page.tsx': {
    at: `/orders/${ORDER}/parts`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/price/page.tsx': {
    at: `/orders/${ORDER}/price`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/papers/page.tsx': {
    at: `/orders/${ORDER}/papers`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/history/page.tsx': {
    at: `/orders/${ORDER}/history`,
    opens: PARTIES,
  },
  '(workspace)/orders/[orderId]/sheets/[sheetId]/page.tsx': {
    at: `/orders/${ORDER}/sheets/${ORDER}`,
    opens: [],
  },
  '(workspace)/shops/page.tsx': { at: '/shops', opens: SIGNED_IN },
  '(workspace)/parts/page.tsx': { at: '/parts', opens: SIGNED_IN },
  '(workspace)/settings/page.tsx': { at: '/settings', opens: SIGNED_IN },
  '(workspace)/turnaround/page.tsx': { at: '/turnaround', opens: OWNERS },
  'print/order/[orderId]/page.tsx': { at: `/print/order/${ORDER}`, opens: PARTIES },
  'print/tag/[orderId]/page.tsx': { at: `/print/tag/${ORDER}`, opens: PARTIES },
};

const ASKERS = {
  sender: 'owner@works.example',
  bench: 'bench@works.example',
  counter: 'counter@works.example',
  partner: 'owner@grinding.example',
  partnerBench: 'bench@grinding.example',
  partnerCounter: 'counter@grinding.example',
  otherPartner: 'owner@rods.example',
  nobody: null,
} as const;
type Asker = keyof typeof ASKERS;

function pagesIn(folder: string, below = ''): string[] {
  return readdirSync(path.join(folder, below), { withFileTypes: true }).flatMap((entry) => {
    const name = path.posix.join(below, entry.name);
    if (entry.isDirectory()) return pagesIn(folder, name);
    return entry.name === 'page.tsx' ? [name] : [];
  });
}

async function seatOf(
  asker: Asker,
  more: { viewport?: typeof DESKTOP; night?: boolean } = {},
): Promise<Seat> {
  const origin = inject('web');
  const seat = await takeSeat(browser, { origin, viewport: more.viewport ?? DESKTOP });
  const email = ASKERS[asker];
  if (email !== null) await signIn(seat.page, email, DEMO_PASSWORD);
  if (more.night) await seat.context.addCookies([{ name: 'shift', value: 'night', url: origin }]);
  return seat;
}

describe('who may open which page', () => {
  it('is said for every page there is', () => {
    expect(Object.keys(PAGES).sort()).toEqual(pagesIn(path.join(process.cwd(), 'app')).sort());
  });

  it.each(Object.keys(ASKERS) as Asker[])('%s opens what is theirs and nothing else', async (asker) => {
    const { context, page } = await seatOf(asker);
    for (const [file, { at, opens }] of Object.entries(PAGES)) {
      const answer = await page.goto(at);
      const landed = new URL(page.url()).pathname;
      const isShown = answer?.status() === 200 && (landed !== '/sign-in' || at === '/sign-in');
      expect(isShown, `${file} for ${asker}: ${answer?.status()} at ${landed}`).toBe(opens.includes(asker));
    }
    await context.close();
  });

  it('keeps a draft from its partner, on every tab', async () => {
    const { context, page } = await seatOf('partner');
    for (const tab of ['', '/edit', '/sizes', '/readings', '/parts', '/price', '/papers', '/history']) {
      expect((await page.goto(`/orders/${DRAFT}${tab}`))?.status()).toBe(404);
    }
    await context.close();
  });
});

describe.each([
  ['on a desktop, by day', { viewport: DESKTOP, night: false }],
  ['on a phone, by day', { viewport: PHONE, night: false }],
  ['on a phone, on the night shift', { viewport: PHONE, night: true }],
  ['on a desktop, on the night shift', { viewport: DESKTOP, night: true }],
])('every page %s', (_words, look) => {
  it('has no fault that axe finds, nothing wider than the screen, and no error', async () => {
    const { context, page, faults } = await seatOf('sender', look);
    const found: string[] = [];
    for (const { at, opens } of Object.values(PAGES).filter((one) => one.opens.includes('sender'))) {
      if (opens.includes('nobody')) continue;
      await page.goto(at);
      for (const violation of await axeViolations(page)) found.push(`${at}: ${violation}`);
      const over = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      if (over > 0) found.push(`${at} is ${over} px too wide`);
    }
    await context.clearCookies();
    if (look.night) await context.addCookies([{ name: 'shift', value: 'night', url: inject('web') }]);
    for (const { at } of Object.values(PAGES).filter((one) => one.opens.includes('nobody'))) {
      await page.goto(at);
      for (const violation of await axeViolations(page)) found.push(`${at}: ${violation}`);
      const over = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      if (over > 0) found.push(`${at} is ${over} px too wide`);
    }
    expect([...found, ...faults]).toEqual([]);
    await context.close();
  });
});
