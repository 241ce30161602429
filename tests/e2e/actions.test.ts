import { randomUUID } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { beforeAll, describe, expect, inject, it } from 'vitest';
import { demoId } from '@/lib/demo/cast';
import { ASKERS, type Asker, type PerAsker, seatEverybody } from '../support/askers';

/** What a press comes to, for one who asks: told apart by the words that come back. */
type Outcome = 'through' | 'role' | 'no such thing' | 'sign in';

interface Press {
  /** What the form sends. */
  readonly form: Readonly<Record<string, string>>;
  readonly outcomes: PerAsker<Outcome>;
}

const everybody = (outcome: Outcome): PerAsker<Outcome> => ({
  ...{ ownOwner: outcome, ownBench: outcome, ownCounter: outcome },
  ...{ partnerOwner: outcome, partnerBench: outcome, partnerCounter: outcome },
  ...{ otherPartner: outcome, stranger: outcome },
});
const OUTSIDE = { otherPartner: 'no such thing', stranger: 'no such thing' } as const;
/** An order's parties get as far as the version they have not seen; outside there is no such order. */
const parties: PerAsker<Outcome> = { ...everybody('through'), ...OUTSIDE };
/** For owners alone, whatever shop they own. */
const owners: PerAsker<Outcome> = {
  ...everybody('through'),
  ...{ ownBench: 'role', ownCounter: 'role', partnerBench: 'role', partnerCounter: 'role' },
};

const ORDER = demoId('order being cut');
const seen = () => ({ orderId: ORDER, version: '999999', requestKey: randomUUID() });
const onOrder = (more: Record<string, string> = {}): Press => ({
  form: { ...seen(), ...more },
  outcomes: parties,
});
const ID = demoId('nobody and nothing');

/** Every server action of a signed-in person, pressed with a sound form that changes nothing. Anything unlisted fails. */
const ACTIONS: Readonly<Record<string, Press>> = {
  sendAction: onOrder(),
  changeAction: onOrder({ neededBackOn: '', notes: '', standingInstruction: '' }),
  quoteAction: onOrder({
    ...{ kind: 'work', extrasWords: '', extras: '', tax: '', promisedOn: '', promiseDays: '3' },
    ...{ validUntil: '', note: '' },
  }),
  answerPriceAction: onOrder({ revision: '1', answer: 'agree', note: '' }),
  endAction: onOrder({ deed: 'cancel', reason: 'x' }),
  settleAction: onOrder({ total: '1', note: '' }),
  answerSettlementAction: onOrder({ answer: 'agree', note: '' }),
  movePromiseAction: onOrder({ promisedOn: '2099-01-01', reason: 'x' }),
  holdAction: onOrder({ reason: 'other', waitsFor: 'sender', words: 'x' }),
  answerHoldAction: onOrder({ holdId: ID, deed: 'lift_hold', words: '' }),
  raiseSnagAction: onOrder({ lineId: '', kind: 'crack', words: 'x', proposal: 'y', price: '', days: '' }),
  answerSnagAction: onOrder({ snagId: ID, answer: 'ask', words: 'x' }),
  startLineAction: onOrder({ lineId: ID }),
  restampAction: onOrder({ partId: ID, from: '5', to: '6', words: '' }),
  reportAction: onOrder(),
  decideAction: onOrder(),
  answerStopAction: onOrder({ unit: 'in', count: '0' }),
  repeatBackAction: onOrder({ rev: '1', unit: 'in', count: '0' }),
  // The counter works out no sizes; of the parties only the sender has sheets to release.
  releaseAction: {
    form: { ...seen(), reason: '' },
    outcomes: { ...parties, ownCounter: 'role', partnerCounter: 'role' },
  },
  lendSheetAction: {
    form: { orderId: ORDER, sheetId: ID, shared: 'yes' },
    outcomes: { ...everybody('no such thing'), ownCounter: 'role', partnerCounter: 'role' },
  },
  // A hand-over is counted whatever the version: a part that is not on the order keeps it from happening.
  movePartAction: {
    form: {
      ...{
        orderId: ORDER,
        version: '1',
        requestKey: randomUUID(),
        kind: 'sent',
        partId: ID,
        pieces: '1',
        stamps: '',
      },
      ...{ carrier: '', condition: '', occurredAt: '2026-12-01T08:00:00Z', replacesId: '' },
    },
    outcomes: parties,
  },
  // Nothing typed is no message: it is refused beside its field before anybody is asked for an order.
  writeMessageAction: {
    form: { orderId: demoId('order a draft'), requestKey: randomUUID(), body: 'x' },
    outcomes: everybody('no such thing'),
  },
  setReferenceAction: { form: { orderId: ORDER, reference: 'PO 7' }, outcomes: parties },
  discardAction: { form: seen(), outcomes: everybody('no such thing') },
  keepDraftAction: {
    form: {
      ...{ orderId: demoId('order a draft'), version: '999999', requestKey: randomUUID(), partnerShopId: '' },
      ...{
        neededBackOn: '',
        transport: 'delivered',
        acceptRule: 'own_check',
        notes: '',
        standingInstruction: '',
      },
      ...{ reference: '', operations: 'polish', partIds: demoId('part a draft') },
    },
    outcomes: { ...everybody('through'), ownOwner: 'through' },
  },
  createBuildAction: {
    form: {
      requestKey: randomUUID(),
      engine: '',
      preset: 'inline6',
      customerName: '',
      notes: '',
      neededOn: '',
    },
    outcomes: everybody('through'),
  },
  changeBuildAction: {
    form: {
      ...{
        buildId: demoId('build six'),
        version: '999999',
        engine: 'x',
        preset: 'inline6',
        customerName: '',
      },
      ...{ notes: '', neededOn: '' },
    },
    outcomes: everybody('through'),
  },
  addPartAction: {
    form: {
      requestKey: randomUUID(),
      buildId: '',
      kind: 'block',
      makerNo: '',
      stamps: '',
      pieces: '0',
      condition: '',
    },
    outcomes: everybody('through'),
  },
  namePartnerAction: {
    form: { requestKey: randomUUID(), shopName: 'X', email: 'no address' },
    outcomes: everybody('through'),
  },
  invitePartnerAction: {
    form: { requestKey: randomUUID(), shopName: 'X', email: 'no address' },
    outcomes: everybody('through'),
  },
  changePartnershipAction: { form: { partnerShopId: ID, version: '1', state: 'paused' }, outcomes: owners },
  notePartnerAction: { form: { partnerShopId: ID, text: 'x' }, outcomes: everybody('no such thing') },
  remindPartnerAction: { form: { partnerShopId: ID }, outcomes: owners },
  changeShopAction: {
    form: {
      ...{
        version: '999999',
        name: 'x',
        unit: 'in',
        timeZone: 'UTC',
        Monday: '',
        Tuesday: '',
        Wednesday: '',
      },
      ...{ Thursday: '', Friday: '', Saturday: '', Sunday: '' },
    },
    outcomes: owners,
  },
  changeHouseAction: { form: { version: '999999', unit: 'in' }, outcomes: owners },
  closeDayAction: { form: { day: '2099-01-01', note: '' }, outcomes: owners },
  openDayAction: { form: { day: '2099-01-01' }, outcomes: owners },
  invitePersonAction: {
    form: { requestKey: randomUUID(), email: 'somebody@shop.example', roles: 'bench' },
    outcomes: owners,
  },
  changeRolesAction: {
    form: { personId: ID, roles: 'bench' },
    outcomes: { ...owners, ...ofOwners('no such thing') },
  },
  removePersonAction: { form: { personId: ID }, outcomes: { ...owners, ...ofOwners('no such thing') } },
  endSignInAction: { form: { signInId: ID }, outcomes: everybody('no such thing') },
  switchShopAction: { form: { shopId: ID }, outcomes: everybody('no such thing') },
  changePersonAction: { form: { personId: ID, password: 'x' }, outcomes: everybody('through') },
};

/** What people, scripts and broken phones put into a box. */
const HOSTILE = [
  ...[
    '',
    ' ',
    'x'.repeat(20_000),
    '<img src=x onerror=alert(1)>',
    '-1',
    '1e309',
    'NaN',
    '\u0000',
    '１２',
    '🔧',
  ],
  ...['{"$gt":""}', "'; drop table orders; --", '__proto__', '../../etc', '2026-02-30', '\u202e2405'],
];

/** For people who are not signed in, or about nothing but this browser. */
const OPEN = new Set([
  ...['acceptAction', 'setPasswordAction', 'askForResetAction', 'newShopAction', 'signInAction'],
  ...['signOutAction', 'switchShiftAction'],
]);

function ofOwners(outcome: Outcome) {
  return { ownOwner: outcome, partnerOwner: outcome, otherPartner: outcome, stranger: outcome } as const;
}

function actionFiles(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const name = path.join(folder, entry.name);
    if (entry.isDirectory()) return actionFiles(name);
    return entry.name === 'actions.ts' ? [name] : [];
  });
}

interface Manifest {
  readonly node: Readonly<
    Record<string, { readonly exportedName: string; readonly workers: Record<string, unknown> }>
  >;
}

let cookies: ReadonlyMap<Asker, string>;
let ids: ReadonlyMap<string, string>;
beforeAll(async () => {
  cookies = await seatEverybody(inject('web'));
  const file = path.join(process.cwd(), '.next', 'server', 'server-reference-manifest.json');
  const { node } = JSON.parse(readFileSync(file, 'utf8')) as Manifest;
  ids = new Map(Object.entries(node).map(([id, { exportedName }]) => [exportedName, id]));
});

/** Presses a button as a browser would send it, on a page that everybody who is signed in may open. */
async function press(name: string, form: Press['form'], by: Asker | null): Promise<string> {
  const body = new FormData();
  for (const [field, value] of Object.entries(form)) body.append(`_1_${field}`, value);
  body.append('0', JSON.stringify([{}, '$K1']));
  const answer = await fetch(`${inject('web')}/bench`, {
    method: 'POST',
    redirect: 'manual',
    headers: {
      ...(by === null ? {} : { cookie: cookies.get(by) ?? '' }),
      ...{ 'next-action': ids.get(name) ?? '', accept: 'text/x-component', origin: inject('web') },
    },
    body,
  });
  return `${answer.headers.get('location') ?? ''} ${await answer.text()}`;
}

/** Words of ours that say no; anything else that says something is through, whatever it says then. */
function outcomeOf(said: string): Outcome {
  if (said.includes('"fields"') && !said.includes('"fields":{}')) return 'through';
  if (said.includes('Please sign in.')) return 'sign in';
  if (said.includes('Your role in this shop does not allow it.')) return 'role';
  if (
    /There is no such|is not in this shop|is not a partner|has ended already|are not in that shop/.test(said)
  )
    return 'no such thing';
  if (/"(message|done)":"/.test(said)) return 'through';
  throw new Error(`Not understood: ${said.slice(0, 400)}`);
}

describe('server actions', () => {
  it('are all listed', () => {
    const there = actionFiles(path.join(process.cwd(), 'app')).flatMap((file) =>
      [...readFileSync(file, 'utf8').matchAll(/^export (?:const|async function) (\w+)/gm)].map(
        ([, name]) => name,
      ),
    );
    expect([...Object.keys(ACTIONS), ...OPEN].toSorted()).toEqual(there.toSorted());
  });

  it.each(Object.entries(ACTIONS))(
    '%s asks everybody who they are and what they may',
    async (name, { form, outcomes }) => {
      const found: Record<string, Outcome> = {};
      for (const by of Object.keys(ASKERS) as Asker[]) found[by] = outcomeOf(await press(name, form, by));
      expect(found).toEqual(outcomes);
      expect(outcomeOf(await press(name, form, null))).toBe('sign in');
    },
  );

  it.each(Object.entries(ACTIONS))(
    '%s takes bad input in any field without breaking, and says what is wrong',
    async (name, { form, outcomes }) => {
      // A stranger to the demonstration presses what belongs to a shop; a party presses what belongs to the order.
      const by = outcomes === parties ? 'ownOwner' : 'stranger';
      const broken: string[] = [];
      for (const field of Object.keys(form)) {
        for (const value of HOSTILE) {
          const said = await press(name, { ...form, [field]: value }, by);
          if (!/"(message|done)":"|\/(bench|builds|orders)/.test(said) || said.includes('Something broke'))
            broken.push(`${field}=${value.slice(0, 20)}: ${said.slice(0, 200)}`);
        }
      }
      expect(broken).toEqual([]);
    },
    120_000,
  );

  it('are refused when another site sends them', async () => {
    const body = new FormData();
    body.append('0', JSON.stringify([{}, '$K1']));
    const answer = await fetch(`${inject('web')}/bench`, {
      method: 'POST',
      headers: {
        ...{ cookie: cookies.get('ownOwner') ?? '', 'next-action': ids.get('closeDayAction') ?? '' },
        origin: 'https://elsewhere.example',
      },
      body,
    });
    expect(answer.status).toBeGreaterThanOrEqual(400);
  });
});
