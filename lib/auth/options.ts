import 'server-only';
import type { NextAuthOptions } from 'next-auth';
import Credentials from 'next-auth/providers/credentials';
import { SESSION_SECONDS, sessionCookieManners, sessionCookieName } from '@/lib/auth/session-cookie';
import { settings } from '@/lib/config/env';
import { signIn } from '@/lib/services/identity';

/**
 * next-auth's settings. The token carries nothing but the secret of a row in sign_ins, so that signing out, a change of
 * role or a removal ends it on the next request; the session shown to scripts carries nothing at all.
 */
export function authOptions(): NextAuthOptions {
  return {
    secret: settings().NEXTAUTH_SECRET,
    session: { strategy: 'jwt', maxAge: SESSION_SECONDS },
    pages: { signIn: '/sign-in' },
    cookies: { sessionToken: { name: sessionCookieName(), options: sessionCookieManners() } },
    providers: [
      Credentials({
        credentials: { email: { label: 'E-mail' }, password: { label: 'Password', type: 'password' } },
        authorize: async (typed, request) => {
          const secret = await signIn({
            email: typed?.email ?? '',
            password: typed?.password ?? '',
            address: 'next-auth',
            agent: String(request.headers?.['user-agent'] ?? ''),
          });
          return secret === null ? null : { id: secret };
        },
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) => ({ signIn: (user as { id?: string } | undefined)?.id ?? token['signIn'] }),
      session: ({ session }) => ({ expires: session.expires }),
      redirect: ({ url, baseUrl }) =>
        new URL(url, baseUrl).origin === baseUrl ? new URL(url, baseUrl).href : baseUrl,
    },
  };
}
