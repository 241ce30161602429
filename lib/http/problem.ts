import 'server-only';
import { reportUnexpected } from '@/lib/adapters/log';
import { AppError, ERROR_STATUS } from '@/lib/errors';

/** Answers a failure as an RFC 9457 problem; only messages written for people leave the house. */
export function toProblemResponse(error: unknown): Response {
  if (!(error instanceof AppError)) {
    const id = reportUnexpected(error);
    return problem(500, {
      type: 'about:blank',
      title: 'Something broke on our side.',
      instance: `urn:error:${id}`,
    });
  }
  const status = ERROR_STATUS[error.code];
  const errors = Object.entries(error.fields).flatMap(([pointer, messages]) =>
    messages.map((detail) => ({ pointer: `#/${pointer}`, detail })),
  );
  return problem(status, {
    type: `urn:wiretag:problem:${error.code}`,
    title: error.message,
    ...(errors.length > 0 ? { errors } : {}),
    ...(error.current === undefined ? {} : { current: error.current }),
  });
}

function problem(status: number, body: Readonly<Record<string, unknown>>): Response {
  const headers = new Headers({
    'content-type': 'application/problem+json; charset=utf-8',
    'cache-control': 'no-store',
  });
  if (status === 429 || status === 503) headers.set('retry-after', '10');
  return new Response(JSON.stringify({ status, ...body }), { status, headers });
}
