import 'server-only';
import { unstable_rethrow } from 'next/navigation';
import type { z } from 'zod';
import { reportUnexpected } from '@/lib/adapters/log';
import { type BrowserTicket, requireTicket } from '@/lib/auth/ticket';
import { AppError, UNWRITABLE } from '@/lib/errors';
import type { FormAction, FormState } from '@/lib/forms/form-state';

type Handle<T, A> = (asked: { readonly data: T; readonly ask: A }) => Promise<FormState>;

/** Builds a server action of a signed-in person. `handle` throws AppError to refuse; on success it redirects or says so. */
export function action<T>(
  schema: z.ZodType<T>,
  handle: Handle<T, BrowserTicket>,
  lists: readonly string[] = [],
): FormAction {
  return build(schema, lists, requireTicket, (data, ask) => handle({ data, ask }));
}

/** Builds a server action for somebody who is not signed in. */
export function openAction<T>(schema: z.ZodType<T>, handle: (data: T) => Promise<FormState>): FormAction {
  return build(schema, [], () => Promise.resolve(null), handle);
}

/** Who asks comes before what they typed. */
function build<T, A>(
  schema: z.ZodType<T>,
  lists: readonly string[],
  who: () => Promise<A>,
  handle: (data: T, ask: A) => Promise<FormState>,
): FormAction {
  return async (_previous, form) => {
    const values = typed(form);
    try {
      const ask = await who();
      const unwritable = unwritableFields(form);
      if (Object.keys(unwritable).length > 0)
        return { message: 'Check the marked fields.', fields: unwritable, values };
      const parsed = schema.safeParse(read(form, lists));
      if (parsed.success) return await handle(parsed.data, ask);
      const fields: Record<string, string[]> = {};
      for (const issue of parsed.error.issues)
        (fields[String(issue.path[0] ?? '')] ??= []).push(issue.message);
      return { message: 'Check the marked fields.', fields, values };
    } catch (error) {
      unstable_rethrow(error);
      return { ...refusal(error), values };
    }
  };
}

/** Fields that hold the one character that no record can hold. */
function unwritableFields(form: FormData): Record<string, string[]> {
  const names = [...form.entries()].flatMap(([name, value]) =>
    typeof value === 'string' && value.includes('\u0000') ? [name] : [],
  );
  return Object.fromEntries(names.map((name) => [name, [UNWRITABLE]]));
}

function refusal(error: unknown): FormState {
  if (error instanceof AppError) return { message: error.message, fields: error.fields };
  return { message: `Something broke on our side (${reportUnexpected(error)}). Nothing was changed.` };
}

function read(form: FormData, lists: readonly string[]): Record<string, unknown> {
  const names = [...new Set(form.keys())].filter((name) => !name.startsWith('$ACTION'));
  const one = Object.fromEntries(names.map((name) => [name, form.get(name)]));
  return { ...one, ...Object.fromEntries(lists.map((name) => [name, form.getAll(name)])) };
}

/** Everything typed, so that a refusal loses nothing; never a password. */
function typed(form: FormData): Record<string, string> {
  const values: Record<string, string> = {};
  for (const [name, value] of form.entries()) {
    if (typeof value !== 'string' || name.startsWith('$ACTION') || /password/i.test(name)) continue;
    values[name] = name in values ? `${values[name] ?? ''}\n${value}` : value;
  }
  return values;
}
