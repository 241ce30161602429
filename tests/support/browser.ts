import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { chromium } from 'playwright-core';

const CHROMIUM_FLAGS = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export const DESKTOP = { width: 1440, height: 1000 };
export const PHONE = { width: 390, height: 844 };

/** Starts Debian's Chromium. */
export function launchBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_FLAGS });
}

/** A browser of one person, with everything collected that must never happen while it is used. */
export interface Seat {
  readonly context: BrowserContext;
  readonly page: Page;
  /** Content-security-policy violations, page errors and console errors, in order. */
  readonly faults: string[];
}

interface SeatOptions {
  readonly origin: string;
  readonly viewport?: { width: number; height: number };
  readonly colorScheme?: 'light' | 'dark';
}

/** Opens a fresh browser context for one person and listens for violations and errors. */
export async function takeSeat(browser: Browser, options: SeatOptions): Promise<Seat> {
  const context = await browser.newContext({
    baseURL: options.origin,
    viewport: options.viewport ?? DESKTOP,
    colorScheme: options.colorScheme ?? 'light',
    locale: 'en-US',
    timezoneId: 'America/Chicago',
  });
  const faults: string[] = [];
  await context.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (violation) => {
      console.error(`CSP: ${violation.effectiveDirective} ${violation.blockedURI} ${violation.sample}`);
    });
  });
  const page = await context.newPage();
  page.on('pageerror', (error) => faults.push(`page error at ${page.url()}: ${error.message}`));
  page.on('console', (line) => {
    if (line.type() === 'error') faults.push(`console error at ${page.url()}: ${line.text()}`);
  });
  return { context, page, faults };
}

/** Signs a person in through the form, as a person does. */
export async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Runs axe with target-size switched on; answers one line a violation. */
export async function axeViolations(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  return page.evaluate(async () => {
    interface AxeNode {
      target: unknown[];
    }
    interface AxeAnswer {
      violations: { id: string; help: string; nodes: AxeNode[] }[];
    }
    const { axe } = globalThis as unknown as { axe: { run: (options: object) => Promise<AxeAnswer> } };
    const { violations } = await axe.run({
      rules: { 'target-size': { enabled: true } },
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
    });
    return violations.map(
      ({ id, help, nodes }) => `${id}: ${help} (${nodes.map((node) => node.target.join(' ')).join(', ')})`,
    );
  });
}
