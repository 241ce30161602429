/** What a member does in a shop. One member may hold several; the owner may do everything. */
export const ROLES = ['owner', 'bench', 'counter'] as const;
export type Role = (typeof ROLES)[number];

/** Everything that is guarded. Services enforce it, screens read it. */
export type Permission =
  | 'order'
  | 'price'
  | 'parts'
  | 'sizes'
  | 'cut'
  | 'readings'
  | 'snag'
  | 'decide'
  | 'hold'
  | 'message'
  | 'builds'
  | 'people'
  | 'partners'
  | 'settings'
  | 'turnaround';

/** Who may do what, role by role. A member's permissions are those of all the roles held. */
export const PERMISSIONS = {
  bench: ['order', 'parts', 'sizes', 'cut', 'readings', 'snag', 'decide', 'hold', 'message', 'builds'],
  counter: ['order', 'price', 'parts', 'hold', 'message', 'builds'],
  owner: [
    'order',
    'price',
    'parts',
    'sizes',
    'cut',
    'readings',
    'snag',
    'decide',
    'hold',
    'message',
    'builds',
    'people',
    'partners',
    'settings',
    'turnaround',
  ],
} as const satisfies Record<Role, readonly Permission[]>;

/** The unit a shop works and prints in. */
export type ShopUnit = 'in' | 'mm';

/** Proof of who is asking: the hash of a sign-in's secret, or the person a background task acts for. */
export type Ticket = { readonly tokenHash: string } | { readonly personId: string; readonly shopId: string };

/** The person asking, in the shop they are signed in to. Always read from the database, never from input. */
export interface Actor {
  readonly personId: string;
  readonly personName: string;
  readonly shopId: string;
  readonly shopName: string;
  readonly roles: readonly Role[];
  readonly unit: ShopUnit;
  /** ISO 4217 code. */
  readonly currency: string;
  /** IANA name, as `America/Chicago`. */
  readonly timeZone: string;
}

/** Says whether any of the actor's roles holds the permission. */
export function can(actor: Pick<Actor, 'roles'>, permission: Permission): boolean {
  return actor.roles.some((role) => (PERMISSIONS[role] as readonly Permission[]).includes(permission));
}
