import 'server-only';
import { begin, type Tx } from '@/db/client';
import {
  closeDay,
  endMembership,
  endOwnSignIn,
  openDay,
  replaceHours,
  updateHouse,
  updateRoles,
  updateShop,
} from '@/db/repositories/shops';
import type { Actor, Role, ShopUnit, Ticket } from '@/lib/domain/actor';
import type { House } from '@/lib/domain/operations/house';
import { AppError } from '@/lib/errors';
import type { Span } from '@/lib/schemas/shop-settings';
import { requirePermission } from '@/lib/services/permission';

interface ShopSettings {
  readonly name: string;
  readonly unit: ShopUnit;
  readonly timeZone: string;
  /** The spans of each day, Monday first. */
  readonly hours: readonly (readonly Span[])[];
}

function stale(): AppError {
  return new AppError(
    'stale',
    'The settings were changed in the meantime. Look at what stands now, then keep again.',
  );
}

/** Changes the shop. @throws AppError stale when somebody changed it first. */
export async function changeShop(ticket: Ticket, version: number, settings: ShopSettings): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'settings');
    if (!(await updateShop(tx, actor, version, settings))) throw stale();
    await replaceHours(tx, actor, settings.hours);
  });
}

/** Closes the shop on a day, or opens it again: working time and promises count without it. */
export async function setClosedDay(
  ticket: Ticket,
  day: string,
  closed: { readonly note: string } | null,
): Promise<void> {
  await begin(ticket, (tx, actor) => {
    requirePermission(actor, 'settings');
    return closed === null ? openDay(tx, actor, day) : closeDay(tx, actor, day, closed.note);
  });
}

/** Keeps the shop's own defaults. @throws AppError stale when somebody changed the shop first. */
export async function changeHouse(ticket: Ticket, version: number, house: House): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    requirePermission(actor, 'settings');
    if (!(await updateHouse(tx, actor, version, house))) throw stale();
  });
}

/** Gives a person other roles; they sign in anew. @throws AppError conflict for the last owner. */
export async function changeRoles(ticket: Ticket, personId: string, roles: readonly Role[]): Promise<void> {
  await onPerson(ticket, (tx, actor) => updateRoles(tx, actor, personId, roles));
}

/** Takes a person out of the shop; their next request finds nobody. @throws AppError conflict for the last owner. */
export async function removePerson(ticket: Ticket, personId: string): Promise<void> {
  await onPerson(ticket, (tx, actor) => endMembership(tx, actor, personId));
}

async function onPerson(ticket: Ticket, work: (tx: Tx, actor: Actor) => Promise<boolean>): Promise<void> {
  try {
    await begin(ticket, async (tx, actor) => {
      requirePermission(actor, 'people');
      if (!(await work(tx, actor))) throw new AppError('not_found', 'That person is not in this shop.');
    });
  } catch (error) {
    if (error instanceof Error && 'constraint' in error && error.constraint === 'shops_keep_an_owner') {
      throw new AppError('conflict', 'A shop keeps at least one owner.');
    }
    throw error;
  }
}

/** Ends one of one's own sign-ins, on another screen perhaps. */
export async function endSignIn(ticket: Ticket, id: string): Promise<void> {
  await begin(ticket, async (tx, actor) => {
    if (!(await endOwnSignIn(tx, actor, id)))
      throw new AppError('not_found', 'That sign-in has ended already.');
  });
}
