import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { DEMO_PASSWORD } from '@/lib/demo/sign-ins';
import { launchBrowser, type Seat, takeSeat } from '../support/browser';

let browser: Browser;
let sender: Seat;
let partner: Seat;
beforeAll(async () => {
  browser = await launchBrowser();
  sender = await takeSeat(browser, { origin: inject('web') });
  partner = await takeSeat(browser, { origin: inject('web') });
});
afterAll(() => browser.close());

/** What has the focus, in the words that a screen reader would begin with; empty where it cannot be seen. */
async function focused(page: Page): Promise<string> {
  return page.evaluate(() => {
    const at = document.activeElement;
    if (!(at instanceof HTMLElement) || at === document.body) return '';
    const { width, height, bottom, top } = at.getBoundingClientRect();
    const { labels } = at as HTMLElement & { labels?: NodeListOf<HTMLLabelElement> | null };
    const labelled = [...(labels ?? [])].map((label) => label.textContent).join(' ');
    const words = [at.getAttribute('aria-label'), labelled, at.textContent].find(Boolean) ?? '';
    const isSeen = Math.min(width, height, bottom) > 0 && top < window.innerHeight;
    return isSeen ? words.replaceAll(/\s+/g, ' ').trim() : '';
  });
}

/** Tabs on until the focus stands on something of that name, as somebody without a mouse does. */
async function tabTo(page: Page, name: string | RegExp): Promise<void> {
  const passed: string[] = [];
  for (let presses = 0; presses < 160; presses += 1) {
    await page.keyboard.press('Tab');
    const words = await focused(page);
    if (typeof name === 'string' ? words.startsWith(name) : name.test(words)) return;
    passed.push(words);
  }
  throw new Error(`No way by Tab to ${String(name)}: ${passed.join(' | ')}`);
}

async function signInByKeys(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in');
  await tabTo(page, 'E-mail');
  await page.keyboard.type(email);
  await tabTo(page, 'Password');
  await page.keyboard.type(DEMO_PASSWORD);
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/bench$/);
}

describe('without a mouse', () => {
  let order = '';

  it('an order is drafted and sent', async () => {
    const { page } = sender;
    await signInByKeys(page, 'bench@works.example');
    await page.goto('/orders/new');
    await page.waitForURL(/draft=/);
    await tabTo(page, 'To');
    await page.keyboard.type('Wick');
    await tabTo(page, /rods, stamp .*B-104/);
    await page.keyboard.press('Space');
    await tabTo(page, 'Crack test');
    await page.keyboard.press('Space');
    await tabTo(page, 'Notes for the machine shop');
    await page.keyboard.type('By keys alone.');
    await tabTo(page, 'Go on to sizes and sending');
    await page.keyboard.press('Enter');
    await page.waitForURL(/\/orders\/[0-9a-f-]{36}\/sizes$/);
    order = new URL(page.url()).pathname.replace('/sizes', '');
    await tabTo(page, 'Send the order');
    await page.keyboard.press('Enter');
    await page.locator('.tag').getByText('Their move: name a price.').waitFor();
  });

  it('it is found with the slash key, priced and talked about', async () => {
    const { page } = partner;
    await signInByKeys(page, 'counter@rods.example');
    const number = await sender.page
      .locator('.tag')
      .getByText(/^WO \d+$/)
      .textContent();
    // The key works once the page's script is there; until then a person presses it again.
    await expect
      .poll(async () => {
        if ((await focused(page)) === '') await page.keyboard.press('/');
        return focused(page);
      })
      .toMatch(/^Find an order/);
    await page.keyboard.type((number ?? '').replace('WO ', ''));
    await page.keyboard.press('Enter');
    await page.waitForURL(/find=/);
    await tabTo(page, /^Open WO/);
    await page.keyboard.press('Enter');
    // The order opens where the move is.
    await page.waitForURL(/\/price$/);
    await tabTo(page, 'Crack test');
    await page.keyboard.type('40.00');
    await tabTo(page, 'or working days');
    await page.keyboard.type('3');
    await tabTo(page, 'Name the price');
    await page.keyboard.press('Enter');
    await page
      .locator('.tag')
      .getByText(/Their move: answer the price/)
      .waitFor();
    await tabTo(page, 'Write to Harrowgate');
    await page.keyboard.type('On Thursday, if it comes tomorrow.');
    await tabTo(page, 'Send');
    await page.keyboard.press('Enter');
    await page.locator('#messages').getByText('On Thursday, if it comes tomorrow.').waitFor();
  });

  it('a hold is put on and lifted', async () => {
    const { page } = partner;
    await page.goto(order);
    await tabTo(page, 'Put a hold on');
    await page.keyboard.press('Enter');
    await tabTo(page, 'What it waits for');
    await page.keyboard.type('The magnetic bench is being mended.');
    await tabTo(page, 'Hold');
    await page.keyboard.press('Enter');
    await page.locator('.tag').getByText('STOP').first().waitFor();
    await tabTo(page, 'Lift the hold');
    await page.keyboard.press('Enter');
    await page.locator('.tag').getByText('STOP').first().waitFor({ state: 'detached' });
  });
});
