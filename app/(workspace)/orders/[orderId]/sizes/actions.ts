'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { newId } from '@/lib/adapters/ids';
import type { KeyedSize } from '@/lib/domain/orders/commands';
import { nanometres } from '@/lib/domain/quantity/length';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';
import { printNear } from '@/lib/domain/quantity/print-length';
import { action } from '@/lib/http/action';
import { orderFormSchema } from '@/lib/schemas/order-forms';
import { runOrderCommand } from '@/lib/services/order-commands';
import { lendWorksheet } from '@/lib/services/worksheets';

/** What is keyed comes as lower:N and upper:N beside line:N and what:N, one pair for each distinct size. */
const keyedSchema = z
  .looseObject({
    ...orderFormSchema.shape,
    rev: z.coerce.number().int(),
    unit: z.enum(['in', 'mm']),
    count: z.coerce.number().int().max(60),
  })
  .transform((form, context) => {
    const read = (name: string) => {
      const text = wordOf(form[name]).trim();
      const parsed = parseLength(text, form.unit);
      if (!parsed.ok)
        context.addIssue({ code: 'custom', path: [name], message: LENGTH_PROBLEM_WORDS[parsed.problem] });
      return { text, value: parsed.ok ? parsed.value : null };
    };
    const sizes = Array.from({ length: form.count }, (_size, index): Omit<KeyedSize, 'id'> | null => {
      const [lower, upper] = [read(`lower:${index}`), read(`upper:${index}`)];
      if (lower.value === null || upper.value === null) return null;
      const place = {
        lineId: wordOf(form[`line:${index}`]),
        what: wordOf(form[`what:${index}`]),
      };
      return {
        ...place,
        lower: lower.value,
        upper: upper.value,
        lowerText: lower.text,
        upperText: upper.text,
        unit: form.unit,
      };
    });
    return { ...form, sizes: sizes.filter((size) => size !== null) };
  });

/** Repeats the sizes back. A difference is refused, shown side by side, and the sender is told. */
export const repeatBackAction = action(keyedSchema, async ({ data, ask }) => {
  const { orderId, version, requestKey, rev } = data;
  const sizes = data.sizes.map((size, index) => ({ ...size, id: index === 0 ? requestKey : newId() }));
  const command = { do: 'repeat_back' as const, rev, sizes };
  const answer = await runOrderCommand(ask, { orderId, expectedVersion: version, requestKey, command });
  revalidatePath(`/orders/${orderId}`, 'layout');
  if (answer.matches === false) {
    const differing = (answer.said ?? []).filter((size) => !size.matches);
    const sides = differing.map(({ what, keyed, asked }) => {
      const [lower, upper] = asked.map((nm) => printNear(nanometres(nm), data.unit));
      return `${what}: you keyed ${keyed.join(' to ')}, rev ${rev} says ${lower ?? ''} to ${upper ?? ''}.`;
    });
    return { message: `Not the same. Do not cut. ${sides.join(' ')} The other shop is told.` };
  }
  return { done: 'The same. The sizes are punched.' };
});

/** Asks the partner to fill a sheet in, or takes it back. */
export const lendSheetAction = action(
  z.object({ orderId: z.uuid(), sheetId: z.uuid(), shared: z.enum(['yes', 'no']) }),
  async ({ data, ask }) => {
    await lendWorksheet(ask, data.sheetId, data.shared === 'yes');
    revalidatePath(`/orders/${data.orderId}`, 'layout');
    return { done: data.shared === 'yes' ? 'The machine shop can fill it in.' : 'Taken back.' };
  },
);

const stopSchema = z
  .looseObject({
    ...orderFormSchema.shape,
    unit: z.enum(['in', 'mm']),
    count: z.coerce.number().int().max(200),
  })
  .transform((form, context) => {
    const cut = Array.from({ length: form.count }, (_feature, index) => {
      const text = wordOf(form[`size:${index}`]).trim();
      const place = {
        lineId: wordOf(form[`line:${index}`]),
        feature: wordOf(form[`feature:${index}`]),
        text,
      };
      if (text === '') return { ...place, size: null };
      const parsed = parseLength(text, form.unit);
      if (!parsed.ok)
        context.addIssue({
          code: 'custom',
          path: [`size:${index}`],
          message: LENGTH_PROBLEM_WORDS[parsed.problem],
        });
      return { ...place, size: parsed.ok ? parsed.value : null };
    });
    return { ...form, cut };
  });

/** Answers a STOP: what is already cut, feature by feature. */
export const answerStopAction = action(stopSchema, async ({ data, ask }) => {
  const { orderId, version, requestKey, cut } = data;
  await runOrderCommand(ask, {
    orderId,
    expectedVersion: version,
    requestKey,
    command: { do: 'answer_stop', cut },
  });
  revalidatePath(`/orders/${orderId}`, 'layout');
  return { done: 'Said. Now repeat the new sizes back.' };
});

function wordOf(value: unknown): string {
  return typeof value === 'string' ? value : '';
}
