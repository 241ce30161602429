import 'server-only';
import { z } from 'zod';

const settingsSchema = z.object({
  DATABASE_URL: z.string().min(1),
  JOBS_DATABASE_URL: z.string().min(1).optional(),
  APP_URL: z.url(),
  NEXTAUTH_SECRET: z.string().min(32),
  INSTALL_ID: z.string().regex(/^[a-z0-9]{1,16}$/),
  S3_ENDPOINT: z.url(),
  S3_REGION: z.string().default('us-east-1'),
  S3_BUCKET: z.string().min(3),
  S3_ACCESS_KEY_ID: z.string().min(1),
  S3_SECRET_ACCESS_KEY: z.string().min(1),
  SMTP_URL: z.string().min(1),
  MAIL_FROM: z.string().min(3),
});

/** Settings of this process, checked once at the first question. */
export type Settings = z.infer<typeof settingsSchema>;

let known: Settings | undefined;

/** The only reader of the environment. @throws Error naming every setting that is missing or wrong. */
export function settings(): Settings {
  if (known) return known;
  const parsed = settingsSchema.safeParse(process.env);
  if (!parsed.success) throw new Error(`Settings: ${z.prettifyError(parsed.error)}`);
  known = parsed.data;
  return known;
}
