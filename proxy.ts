import { type NextRequest, NextResponse } from 'next/server';

const FILES = process.env['S3_ENDPOINT'] ?? '';

/** A policy of its own for each page: only scripts that carry this answer's nonce run. */
export function proxy(request: NextRequest): NextResponse {
  const nonce = btoa(crypto.randomUUID());
  const isDevelopment = process.env.NODE_ENV !== 'production';
  const policy = [
    "default-src 'none'",
    `script-src 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? " 'unsafe-eval'" : ''}`,
    `style-src 'self'${isDevelopment ? " 'unsafe-inline'" : ` 'nonce-${nonce}'`}`,
    `img-src 'self' blob: data: ${FILES}`,
    "font-src 'self'",
    "connect-src 'self'",
    "manifest-src 'self'",
    "form-action 'self'",
    "base-uri 'none'",
    "object-src 'none'",
    "frame-ancestors 'none'",
  ].join('; ');
  const headers = new Headers(request.headers);
  headers.set('x-nonce', nonce);
  headers.set('content-security-policy', policy);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  return response;
}

// Uploads stay out: a proxy cuts bodies over 10 MB off.
export const config = { matcher: [{ source: '/((?!api/|_next/static|_next/image|favicon.ico).*)' }] };
