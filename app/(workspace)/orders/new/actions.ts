'use server';

import { redirect } from 'next/navigation';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { draftSchema } from '@/lib/schemas/order-draft';
import { createDraft } from '@/lib/services/order-drafts';

const schema = draftSchema.extend({ requestKey: z.uuid() });

/** Opens a draft and goes to it. */
export const createDraftAction = action(
  schema,
  async ({ data: { requestKey, ...draft }, ask }) => {
    const { id } = await createDraft(ask, requestKey, draft);
    redirect(`/orders/${id}`);
  },
  ['partIds', 'operations'],
);
