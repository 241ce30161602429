'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { orderFormSchema } from '@/lib/schemas/order-forms';
import { runOrderCommand } from '@/lib/services/order-commands';

const perLine = (form: Readonly<Record<string, unknown>>, prefix: string) =>
  Object.entries(form).flatMap(([name, value]) =>
    name.startsWith(prefix) && typeof value === 'string'
      ? [{ lineId: name.slice(prefix.length), value: value.trim() }]
      : [],
  );

const reportSchema = z.looseObject(orderFormSchema.shape);

/** Reports the work finished, with a reason for each line whose places are not all read. */
export const reportAction = action(reportSchema, async ({ data, ask }) => {
  const unread = perLine(data, 'unread:').map(({ lineId, value }) => ({ lineId, reason: value }));
  const { orderId, version, requestKey } = data;
  await runOrderCommand(ask, {
    orderId,
    expectedVersion: version,
    requestKey,
    command: { do: 'report', unread },
  });
  revalidatePath(`/orders/${orderId}`, 'layout');
  return { done: 'Reported finished.' };
});

const decisionSchema = z.enum(['accept', 'as_is', 'send_back', 'reject']);

const decideSchema = z.looseObject(orderFormSchema.shape).transform((form, context) => {
  // One box a feature, as feature:LINE:FEATURE; none ticked means the whole line.
  const ticked = perLine(form, 'feature:').map(({ lineId: name }) => ({
    lineId: name.slice(0, name.indexOf(':')),
    feature: name.slice(name.indexOf(':') + 1),
  }));
  const reasons = new Map(perLine(form, 'reason:').map(({ lineId, value }) => [lineId, value]));
  const decisions = perLine(form, 'decision:').flatMap(({ lineId, value }) => {
    const decision = decisionSchema.safeParse(value);
    if (decision.success)
      return [
        {
          ...{ lineId, decision: decision.data, reason: reasons.get(lineId) ?? '' },
          features: ticked.flatMap((one) => (one.lineId === lineId ? [one.feature] : [])),
        },
      ];
    context.addIssue({ code: 'custom', path: [`decision:${lineId}`], message: 'Decide on this line.' });
    return [];
  });
  return { ...form, decisions };
});

/** Decides on the work, line by line. */
export const decideAction = action(decideSchema, async ({ data, ask }) => {
  const { orderId, version, requestKey, decisions } = data;
  await runOrderCommand(ask, {
    orderId,
    expectedVersion: version,
    requestKey,
    command: { do: 'decide', decisions },
  });
  revalidatePath(`/orders/${orderId}`, 'layout');
  return { done: 'Decided.' };
});
