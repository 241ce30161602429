import { z } from 'zod';

const rawSchema = z
  .record(z.string().max(80), z.string().max(200))
  .refine((raw) => Object.keys(raw).length <= 500, 'This is too much for one sheet.');

/** What was typed on a sheet, by path, sound or not. */
export const worksheetSchema = z.strictObject({ raw: rawSchema });
