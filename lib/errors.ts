/** The few ways in which a request can be refused, each with its HTTP status. */
export const ERROR_STATUS = {
  invalid: 422,
  unauthenticated: 401,
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  stale: 412,
  version_required: 428,
  rate_limited: 429,
  unavailable: 503,
} as const;

export type ErrorCode = keyof typeof ERROR_STATUS;

/** Messages that belong beside a field, by the field's name. */
export type FieldMessages = Readonly<Record<string, readonly string[]>>;

/** A refusal whose message is written for the person who asked. Any other error is a bug. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly fields: FieldMessages;
  /** For `stale`: what stands now, so that both values can be shown. */
  readonly current: unknown;

  constructor(code: ErrorCode, message: string, more: { fields?: FieldMessages; current?: unknown } = {}) {
    super(message);
    this.name = 'AppError';
    this.code = code;
    this.fields = more.fields ?? {};
    this.current = more.current;
  }
}

/** Said of a text with a NUL in it: some keyboards and scanners send one. */
export const UNWRITABLE = 'There is a character in here that cannot be kept. Type it again.';
