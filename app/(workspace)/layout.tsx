import { redirect } from 'next/navigation';
import type { ReactNode } from 'react';
import { signOutAction } from '@/app/(public)/sign-in/actions';
import { changePersonAction, switchShiftAction, switchShopAction } from '@/app/(workspace)/who/actions';
import { Rail } from '@/components/shell/rail';
import { loadShell } from '@/db/read-models/shell';
import { requirePageTicket } from '@/lib/auth/ticket';
import { can } from '@/lib/domain/actor';
import { AppError } from '@/lib/errors';

export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const ticket = await requirePageTicket();
  const shell = await loadShell(ticket).catch((error: unknown) => {
    if (error instanceof AppError && error.code === 'unauthenticated') redirect('/sign-in');
    throw error;
  });
  const places = [
    { href: '/bench', label: 'Bench' },
    { href: '/builds', label: 'Builds' },
    { href: '/orders', label: 'Work orders' },
    { href: '/parts', label: 'Parts' },
    { href: '/shops', label: 'Shops' },
    ...(can(shell.actor, 'turnaround') ? [{ href: '/turnaround', label: 'Turnaround' }] : []),
  ];
  return (
    <>
      <Rail
        places={places}
        person={shell.actor.personName}
        shop={shell.actor.shopName}
        shopId={shell.actor.shopId}
        shops={shell.shops}
        colleagues={shell.colleagues}
        actions={{
          signOut: signOutAction,
          changePerson: changePersonAction,
          switchShop: switchShopAction,
          switchShift: switchShiftAction,
        }}
      />
      {children}
    </>
  );
}
