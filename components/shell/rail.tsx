'use client';

import { usePathname } from 'next/navigation';
import { FindKey } from '@/components/shell/find-key';
import { Form, Submit } from '@/components/forms/form';
import { SelectField, TextField } from '@/components/forms/fields';
import { Wordmark } from '@/components/ui/wordmark';
import type { FormAction } from '@/lib/forms/form-state';

interface Named {
  readonly id: string;
  readonly name: string;
}

interface RailProps {
  places: readonly { href: string; label: string }[];
  person: string;
  shop: string;
  shopId: string;
  shops: readonly Named[];
  colleagues: readonly Named[];
  actions: {
    signOut: () => Promise<void>;
    changePerson: FormAction;
    switchShop: FormAction;
    switchShift: (form: FormData) => Promise<void>;
  };
}

/** The rail over every page: where one is, the find box, and who is working. */
export function Rail({ places, person, shop, shopId, shops, colleagues, actions }: RailProps) {
  const path = usePathname();
  const here = (href: string) => (path.startsWith(href) ? ('page' as const) : undefined);
  return (
    <header className="rail no-print flex flex-wrap items-center gap-x-7 bg-rail px-4 text-[#f3efe3] sm:px-7">
      <a href="/bench" className="py-3.5" aria-label="Wiretag, to the bench">
        <Wordmark />
      </a>
      <nav
        aria-label="Main"
        className="order-last -mx-1 flex w-full gap-x-1 overflow-x-auto lg:order-none lg:w-auto"
      >
        {places.map(({ href, label }) => (
          <a
            key={href}
            href={href}
            aria-current={here(href)}
            className="border-b-[3px] border-transparent px-2.5 pt-[17px] pb-3.5 text-[15px] whitespace-nowrap text-[#c9ced6] hover:text-white aria-[current]:border-[#e3c06b] aria-[current]:text-white"
          >
            {label}
          </a>
        ))}
      </nav>
      <form action="/orders" role="search" className="ml-auto max-sm:order-2 max-sm:w-full max-sm:pb-2">
        <input type="hidden" name="show" value="all" />
        <FindKey boxId="find" />
        <input
          id="find"
          name="find"
          aria-keyshortcuts="/"
          type="search"
          aria-label="Find an order, stamp or engine"
          placeholder="Find an order, stamp or engine"
          className="min-h-9 w-full rounded border border-[#566577] bg-[#26313f] px-3 text-sm text-[#f3efe3] placeholder:text-[#c9ced6] sm:w-64"
        />
      </form>
      <details className="group relative max-sm:ml-auto">
        <summary className="cursor-pointer list-none py-3 text-sm text-[#c9ced6]">
          <b className="font-semibold text-white">{shop}</b>
          <span className="max-sm:hidden"> · {person}</span> <span aria-hidden>▾</span>
        </summary>
        <div className="sheet absolute right-0 z-20 grid w-72 gap-4 p-4 text-ink shadow-lg">
          {colleagues.length > 0 && (
            <Form action={actions.changePerson} className="grid gap-2" label="Change person">
              <SelectField
                name="personId"
                label="Somebody else at this screen"
                options={[
                  { value: '', label: 'Choose' },
                  ...colleagues.map(({ id, name }) => ({ value: id, label: name })),
                ]}
              />
              <TextField name="password" label="Their password" type="password" autoComplete="off" />
              <Submit kind="ghost">Change person</Submit>
            </Form>
          )}
          {shops.length > 1 && (
            <Form action={actions.switchShop} className="grid gap-2" label="Change shop">
              <SelectField
                name="shopId"
                label="Shop"
                defaultValue={shopId}
                options={shops.map(({ id, name }) => ({ value: id, label: name }))}
              />
              <Submit kind="ghost">Change shop</Submit>
            </Form>
          )}
          <form action={actions.switchShift} className="flex gap-2">
            <button className="btn btn-ghost grow" name="shift" value="day">
              Day shift
            </button>
            <button className="btn btn-ghost grow" name="shift" value="night">
              Night shift
            </button>
          </form>
          <a href="/settings" className="btn btn-ghost">
            Settings
          </a>
          <form action={actions.signOut}>
            <button className="btn w-full">Sign out</button>
          </form>
        </div>
      </details>
    </header>
  );
}
