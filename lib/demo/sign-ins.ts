import type { Role } from '@/lib/domain/actor';

/** The same for everybody in the demonstration. */
export const DEMO_PASSWORD = 'measure twice';

/** One person of the demonstration. */
export interface DemoSignIn {
  readonly key: string;
  readonly shop: string;
  readonly shopKey: 'works' | 'grinding' | 'boring' | 'rods';
  readonly role: Role;
  readonly name: string;
  readonly email: string;
}

const SHOPS = {
  works: 'Harrowgate Engine Works',
  grinding: 'Tamsin Crank Grinding',
  boring: 'Oldfield Bore and Hone',
  rods: 'Wick Lane Rods',
} as const;

const PEOPLE = [
  ['works', 'owner', 'Ada Harrowgate'],
  ['works', 'bench', 'Ben Sorrel'],
  ['works', 'counter', 'Cleo Marsh'],
  ['grinding', 'owner', 'Tam Singer'],
  ['grinding', 'bench', 'Gil Thorne'],
  ['grinding', 'counter', 'Pia Lund'],
  ['boring', 'owner', 'Otto Field'],
  ['boring', 'bench', 'Hanna Boe'],
  ['boring', 'counter', 'Ravi Dell'],
  ['rods', 'owner', 'Wilma Lane'],
  ['rods', 'bench', 'Rex Quill'],
  ['rods', 'counter', 'Nora Łódzka'],
] as const;

/** Everybody who can sign in to the demonstration: each role of each shop. */
export const DEMO_SIGN_INS: readonly DemoSignIn[] = PEOPLE.map(([shopKey, role, name]) => ({
  ...{
    key: `${shopKey}-${role}`,
    shop: SHOPS[shopKey],
    shopKey,
    role,
    name,
    email: `${role}@${shopKey}.example`,
  },
}));
