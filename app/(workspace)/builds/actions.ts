'use server';

import { revalidatePath } from 'next/cache';
import { redirect } from 'next/navigation';
import { z } from 'zod';
import { action } from '@/lib/http/action';
import { buildSchema, partSchema } from '@/lib/schemas/build';
import { addPart, changeBuild, createBuild } from '@/lib/services/builds';

const keyed = { requestKey: z.uuid() };

/** Opens a build and goes to it. */
export const createBuildAction = action(
  buildSchema.extend(keyed),
  async ({ data: { requestKey, ...build }, ask }) => {
    const { id } = await createBuild(ask, requestKey, build);
    redirect(`/builds/${id}`);
  },
);

const changeSchema = buildSchema.extend({ buildId: z.uuid(), version: z.coerce.number().int() });

/** Changes a build. */
export const changeBuildAction = action(
  changeSchema,
  async ({ data: { buildId, version, ...build }, ask }) => {
    await changeBuild(ask, buildId, version, build);
    revalidatePath(`/builds/${buildId}`);
    return { done: 'Kept.' };
  },
);

const addSchema = z.intersection(
  partSchema,
  z.object({
    ...keyed,
    buildId: z
      .string()
      .transform((id) => id || null)
      .pipe(z.uuid().nullable()),
  }),
);

/** Adds a part to a build, or to none. */
export const addPartAction = action(addSchema, async ({ data: { requestKey, ...part }, ask }) => {
  await addPart(ask, requestKey, part);
  revalidatePath('/builds', 'layout');
  revalidatePath('/parts');
  revalidatePath('/orders', 'layout');
  return { done: `Added: ${part.pieces} ${part.kind}.` };
});
