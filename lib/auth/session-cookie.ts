import 'server-only';
import { decode, encode } from 'next-auth/jwt';
import { cookies } from 'next/headers';
import { settings } from '@/lib/config/env';

/** A sign-in lasts thirty days at most; the database ends it earlier when nothing happens. */
export const SESSION_SECONDS = 30 * 24 * 3600;

/** Cookies are shared across ports of one host, so the name carries the copy's id where __Host- cannot be used. */
export function sessionCookieName(): string {
  const { APP_URL, INSTALL_ID } = settings();
  return APP_URL.startsWith('https:') ? '__Host-wiretag' : `wiretag-${INSTALL_ID}`;
}

/** How the session cookie is sent. */
export function sessionCookieManners() {
  return {
    httpOnly: true,
    sameSite: 'lax' as const,
    path: '/',
    secure: settings().APP_URL.startsWith('https:'),
  };
}

/** Puts the sign-in's secret into the session cookie, encrypted as next-auth does. */
export async function keepSession(secret: string): Promise<void> {
  const token = await encode({
    token: { signIn: secret },
    secret: settings().NEXTAUTH_SECRET,
    maxAge: SESSION_SECONDS,
  });
  (await cookies()).set(sessionCookieName(), token, { ...sessionCookieManners(), maxAge: SESSION_SECONDS });
}

/** Takes the session cookie away. */
export async function dropSession(): Promise<void> {
  (await cookies()).delete(sessionCookieName());
}

/** The sign-in's secret from the cookie, if there is one that was made here. */
export async function readSession(): Promise<string | undefined> {
  const token = (await cookies()).get(sessionCookieName())?.value;
  if (token === undefined) return undefined;
  try {
    const read = await decode({ token, secret: settings().NEXTAUTH_SECRET });
    const secret: unknown = read?.['signIn'];
    return typeof secret === 'string' ? secret : undefined;
  } catch {
    return undefined;
  }
}
