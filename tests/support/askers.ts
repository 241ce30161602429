import { DEMO_PASSWORD } from '@/lib/demo/sign-ins';
import { launchBrowser, signIn, takeSeat } from './browser';

/** Who asks: each role of the sender and of its partner, another partner of the sender, and a shop that knows neither. */
export const ASKERS = {
  ownOwner: 'owner@works.example',
  ownBench: 'bench@works.example',
  ownCounter: 'counter@works.example',
  partnerOwner: 'owner@grinding.example',
  partnerBench: 'bench@grinding.example',
  partnerCounter: 'counter@grinding.example',
  otherPartner: 'owner@rods.example',
  stranger: 'owner@stranger.example',
} as const;
export type Asker = keyof typeof ASKERS;
export type PerAsker<T> = Readonly<Record<Asker, T>>;

/** Signs everybody in through the form, each in a browser of their own; answers their cookies. */
export async function seatEverybody(origin: string): Promise<ReadonlyMap<Asker, string>> {
  const browser = await launchBrowser();
  const cookies = new Map<Asker, string>();
  const strangers = await takeSeat(browser, { origin });
  await strangers.page.goto('/new-shop');
  await strangers.page.getByLabel('Name of the shop').fill('Strangers');
  await strangers.page.getByLabel('Your name').fill('A. Stranger');
  await strangers.page.getByLabel('E-mail').fill(ASKERS.stranger);
  await strangers.page.getByLabel('Password').fill(DEMO_PASSWORD);
  await strangers.page.getByRole('button', { name: 'Open the shop' }).click();
  await strangers.page
    .getByText(/could not be opened|Your move/)
    .first()
    .waitFor();
  await strangers.context.close();
  for (const [asker, email] of Object.entries(ASKERS)) {
    const { page, context } = await takeSeat(browser, { origin });
    await signIn(page, email, DEMO_PASSWORD);
    const own = (await context.cookies()).map(({ name, value }) => `${name}=${value}`).join('; ');
    cookies.set(asker as Asker, own);
    await context.close();
  }
  await browser.close();
  return cookies;
}
