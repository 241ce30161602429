/** What a pure function answers when a person's input or move may be refused. */
export type Result<T, P> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: P };

/** A success holding its value. */
export function ok<T>(value: T): { readonly ok: true; readonly value: T } {
  return { ok: true, value };
}

/** A refusal holding its reason. */
export function fail<P>(problem: P): { readonly ok: false; readonly problem: P } {
  return { ok: false, problem };
}
