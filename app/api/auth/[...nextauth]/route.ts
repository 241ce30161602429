import type { NextRequest } from 'next/server';
import NextAuth from 'next-auth';
import { authOptions } from '@/lib/auth/options';

interface Context {
  params: Promise<{ nextauth: string[] }>;
}

/** next-auth's own routes. */
async function answer(request: NextRequest, context: Context): Promise<Response> {
  const handle = NextAuth(authOptions()) as (
    request: NextRequest,
    context: { params: { nextauth: string[] } },
  ) => Promise<Response>;
  return handle(request, { params: await context.params });
}

export { answer as GET, answer as POST };
