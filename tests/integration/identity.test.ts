import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { begin } from '@/db/client';
import { linkSecret } from '@/lib/adapters/links';
import { changePerson, isSignedIn, signIn, signOut, switchShop, tokenHash } from '@/lib/services/identity';
import { acceptInvitation, invitePerson, readInvitation } from '@/lib/services/invitations';
import { askForReset, setNewPassword } from '@/lib/services/password-reset';
import { loadShop } from '@/db/read-models/shop';
import { changeRoles, changeShop, endSignIn, removePerson } from '@/lib/services/shop-settings';
import { ownDatabase, readAsSuperuser } from '../support/database';
import { buildPartner, buildPerson, buildShop, PASSWORD, ticketOf } from '../support/shops';

/** Two spans from Monday to Friday, one on Saturday. */
const WEEK = [
  ...Array.from({ length: 5 }, () => [
    { opens: '07:00', closes: '12:00' },
    { opens: '13:00', closes: '16:00' },
  ]),
  [{ opens: '08:00', closes: '12:00' }],
  [],
];

const own = ownDatabase();
const at = { address: 'here', agent: 'test' };

describe('signing in', () => {
  it('answers the same for an unknown address, a wrong password and an empty one', async () => {
    const shop = await buildShop();
    expect(await signIn({ email: shop.ownerEmail, password: 'wrong', ...at })).toBeNull();
    expect(await signIn({ email: 'nobody@shop.example', password: PASSWORD, ...at })).toBeNull();
  });

  it('takes the address however it is written', async () => {
    const shop = await buildShop();
    expect(
      await signIn({ email: ` ${shop.ownerEmail.toUpperCase()} `, password: PASSWORD, ...at }),
    ).not.toBeNull();
  });

  it('stops after ten tries for one address, and only for that one', async () => {
    const [one, two] = [await buildShop(), await buildShop()];
    for (let tries = 0; tries < 9; tries += 1)
      await signIn({ email: one.ownerEmail, password: 'wrong', ...at });
    await expect(signIn({ email: one.ownerEmail, password: PASSWORD, ...at })).rejects.toMatchObject({
      code: 'rate_limited',
    });
    expect(await signIn({ email: two.ownerEmail, password: PASSWORD, ...at })).not.toBeNull();
  });

  it('keeps only hashes: neither the secret nor the password stands in the database', async () => {
    const shop = await buildShop();
    const secret = await signIn({ email: shop.ownerEmail, password: PASSWORD, ...at });
    const rows = await readAsSuperuser<{ text: string }>(
      own.superuserUrl(),
      `select row(s.*)::text || coalesce(p.password_hash, '') as text from sign_ins s join people p on p.id = s.person_id`,
    );
    expect(rows.some(({ text }) => text.includes(String(secret)) || text.includes(PASSWORD))).toBe(false);
    expect(rows.every(({ text }) => text.includes('$argon2id$'))).toBe(true);
  });
});

describe('a sign-in ends on the next request', () => {
  it('after signing out', async () => {
    const { owner } = await buildShop();
    expect(await isSignedIn(owner)).toBe(true);
    await signOut(owner);
    expect(await isSignedIn(owner)).toBe(false);
  });

  it('after being removed from the shop; the last owner cannot be removed', async () => {
    const shop = await buildShop();
    const bench = await buildPerson(shop, ['bench']);
    const [person] = await readAsSuperuser<{ id: string }>(
      own.superuserUrl(),
      'select id from people where email_norm = $1',
      [bench.email],
    );
    await removePerson(shop.owner, person?.id ?? '');
    expect(await isSignedIn(bench)).toBe(false);
    const ownerId = await begin(shop.owner, (_tx, actor) => Promise.resolve(actor.personId));
    await expect(removePerson(shop.owner, ownerId)).rejects.toMatchObject({ code: 'conflict' });
  });

  it('after its time is over', async () => {
    const { owner } = await buildShop();
    await readAsSuperuser(
      own.superuserUrl(),
      'update sign_ins set idle_until = now() where token_hash = $1',
      [owner.tokenHash],
    );
    expect(await isSignedIn(owner)).toBe(false);
  });

  it('when its person gets other roles in the shop: they sign in anew, with those', async () => {
    const shop = await buildShop();
    const counter = await buildPerson(shop, ['counter']);
    const roles = (ticket: { tokenHash: string }) => begin(ticket, (_tx, actor) => Promise.resolve(actor));
    const { personId, roles: before } = await roles(counter);
    expect(before).toEqual(['counter']);
    await expect(changeRoles(counter, personId, ['owner'])).rejects.toMatchObject({ code: 'forbidden' });
    await changeRoles(shop.owner, personId, ['bench']);
    await expect(roles(counter)).rejects.toMatchObject({ code: 'unauthenticated' });
    expect((await roles(await ticketOf(counter.email))).roles).toEqual(['bench']);
    const owner = await roles(shop.owner);
    await expect(changeRoles(shop.owner, owner.personId, ['bench'])).rejects.toMatchObject({
      code: 'conflict',
    });
    expect(await isSignedIn(shop.owner)).toBe(true);
  });

  it('when it is ended from another screen, and nobody ends another person’s', async () => {
    const shop = await buildShop();
    const second = await ticketOf(shop.ownerEmail);
    const bench = await buildPerson(shop, ['bench']);
    const listed = (ticket: { tokenHash: string }) =>
      begin(ticket, async (tx, actor) => (await loadShop(tx, actor, ticket.tokenHash)).signIns);
    const mine = await listed(second);
    expect(mine.map(({ isThis }) => isThis).toSorted()).toEqual([false, true]);
    const [theirs] = await listed(bench);
    await expect(endSignIn(second, theirs?.id ?? '')).rejects.toMatchObject({ code: 'not_found' });
    await endSignIn(second, mine.find(({ isThis }) => !isThis)?.id ?? '');
    expect(await isSignedIn(shop.owner)).toBe(false);
    expect(await isSignedIn(second)).toBe(true);
  });
});

describe('invitations', () => {
  it('open once, for one of fifty who press at the same moment', async () => {
    const shop = await buildShop();
    const email = `many-${randomUUID()}@shop.example`;
    const { invitationId } = await invitePerson(shop.owner, randomUUID(), { email, roles: ['bench'] });
    const secret = linkSecret('invitation', invitationId);
    expect(await readInvitation(secret)).toMatchObject({ email, known: false });
    const presses = Array.from({ length: 50 }, () =>
      acceptInvitation(secret, { name: 'One', password: PASSWORD, signedInId: null }),
    );
    const outcomes = await Promise.allSettled(presses);
    expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect(await readInvitation(secret)).toBeUndefined();
  });

  it('are for their own person: an address with an account must sign in first', async () => {
    const [one, two] = [await buildShop(), await buildShop()];
    const { invitationId } = await invitePerson(one.owner, randomUUID(), {
      email: two.ownerEmail,
      roles: ['bench'],
    });
    const secret = linkSecret('invitation', invitationId);
    await expect(
      acceptInvitation(secret, { name: 'x', password: 'stolen-password', signedInId: null }),
    ).rejects.toMatchObject({ code: 'forbidden' });
    expect(await signIn({ email: two.ownerEmail, password: PASSWORD, ...at })).not.toBeNull();
    const personId = await begin(two.owner, (_tx, actor) => Promise.resolve(actor.personId));
    await acceptInvitation(secret, { name: 'x', password: PASSWORD, signedInId: personId });
    await switchShop(two.owner, one.shopId);
    expect(await begin(two.owner, (_tx, actor) => Promise.resolve(actor.shopId))).toBe(one.shopId);
  });

  it('are refused to those who may not invite', async () => {
    const shop = await buildShop();
    const bench = await buildPerson(shop, ['bench']);
    await expect(
      invitePerson(bench, randomUUID(), { email: 'x@shop.example', roles: ['owner'] }),
    ).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('a shared screen', () => {
  it('changes person only with that person’s own password, and only within the shop', async () => {
    const shop = await buildShop();
    const bench = await buildPerson(shop, ['bench']);
    const other = await buildPartner(shop);
    const idOf = (ticket: { tokenHash: string }) =>
      begin(ticket, (_tx, actor) => Promise.resolve(actor.personId));
    const benchId = await idOf(bench);
    expect(await changePerson(shop.owner, { personId: benchId, password: 'wrong', ...at })).toBeNull();
    expect(
      await changePerson(shop.owner, { personId: await idOf(other.owner), password: PASSWORD, ...at }),
    ).toBeNull();
    const secret = await changePerson(shop.owner, { personId: benchId, password: PASSWORD, ...at });
    expect(secret).not.toBeNull();
    expect(await isSignedIn(shop.owner)).toBe(false);
    expect(await idOf({ tokenHash: tokenHash(secret ?? '') })).toBe(benchId);
  });
});

describe('settings', () => {
  it('are changed by an owner only, and only from the version seen', async () => {
    const shop = await buildShop();
    const wanted = {
      name: 'New name',
      unit: 'mm' as const,
      timeZone: 'UTC',
      hours: WEEK,
    };
    const bench = await buildPerson(shop, ['bench']);
    await expect(changeShop(bench, 1, wanted)).rejects.toMatchObject({ code: 'forbidden' });
    await changeShop(shop.owner, 1, wanted);
    await expect(changeShop(shop.owner, 1, wanted)).rejects.toMatchObject({ code: 'stale' });
    expect(await begin(await ticketOf(shop.ownerEmail), (_tx, actor) => Promise.resolve(actor.unit))).toBe(
      'mm',
    );
  });
});

describe('a new password by e-mail', () => {
  it('says the same for an address that has no account, and writes nothing down for it', async () => {
    await askForReset('nobody@shop.example');
    expect(
      await readAsSuperuser(
        own.superuserUrl(),
        `select 1 from notices where email_norm = 'nobody@shop.example'`,
      ),
    ).toEqual([]);
  });

  it('opens once, sets the password, and ends every sign-in of the person', async () => {
    const shop = await buildShop();
    await askForReset(shop.ownerEmail);
    const [notice] = await readAsSuperuser<{ detail: { resetId: string } }>(
      own.superuserUrl(),
      'select detail from notices where email_norm = $1',
      [shop.ownerEmail],
    );
    const secret = linkSecret('reset', notice?.detail.resetId ?? '');
    await setNewPassword(secret, 'another-good-one');
    expect(await isSignedIn(shop.owner)).toBe(false);
    expect(await signIn({ email: shop.ownerEmail, password: PASSWORD, ...at })).toBeNull();
    expect(await signIn({ email: shop.ownerEmail, password: 'another-good-one', ...at })).not.toBeNull();
    await expect(setNewPassword(secret, 'a-third-one')).rejects.toMatchObject({ code: 'not_found' });
  });

  it('is asked for at most five times an hour', async () => {
    const ask = () => askForReset('often@shop.example');
    for (let tries = 0; tries < 5; tries += 1) await ask();
    await expect(ask()).rejects.toMatchObject({ code: 'rate_limited' });
  });
});
