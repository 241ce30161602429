import { z } from 'zod';

/** Passwords that are tried first by anybody. */
const COMMON = new Set([
  ...[
    'password',
    'password1',
    'password123',
    '12345678',
    '123456789',
    '1234567890',
    'qwertyuiop',
    'qwerty123',
    'letmein123',
    'iloveyou',
  ],
  ...[
    'sunshine1',
    'football1',
    'baseball1',
    'welcome123',
    'admin1234',
    'abcdefgh',
    'abcd1234',
    'changeme',
    'trustno1',
    'crankshaft',
  ],
]);

/** A new password: eight letters or more, none of the common ones, nothing else asked. */
export const newPasswordSchema = z
  .string()
  .min(8, 'Use at least 8 letters; 15 are better.')
  .max(200, 'Use at most 200 letters.')
  .refine(
    (password) => !COMMON.has(password.toLowerCase()),
    'This password is one of the first that anybody tries. Choose another.',
  );

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('Give an e-mail address, as name@shop.com.').max(200));

export const nameSchema = z
  .string()
  .trim()
  .min(1, 'Give your name: it stands on what you do.')
  .max(80, 'Use at most 80 letters.');

export const signInSchema = z.object({
  email: z.string().trim().min(1, 'Give your e-mail address.').max(200),
  password: z.string().min(1, 'Give your password.').max(200),
});

export const acceptSchema = z.object({
  secret: z.string().min(20).max(100),
  /** The order that came with the invitation, to go on to. */
  orderId: z.uuid().optional().catch(undefined),
  name: nameSchema,
  password: newPasswordSchema,
});

export const shopNameSchema = z.string().trim().min(1, 'Name the shop.').max(80, 'Use at most 80 letters.');

const ZONES = new Set(Intl.supportedValuesOf('timeZone'));
export const timeZoneSchema = z
  .string()
  .refine((zone) => zone === 'UTC' || ZONES.has(zone), 'Choose a time zone.');

export const newShopSchema = z.object({
  shopName: shopNameSchema,
  unit: z.enum(['in', 'mm'], 'Choose the unit you work in.'),
  currency: z.enum(['USD', 'CAD', 'EUR', 'GBP', 'AUD', 'NZD', 'PLN', 'SEK'], 'Choose the currency.'),
  timeZone: timeZoneSchema,
  name: nameSchema,
  email: emailSchema,
  password: newPasswordSchema,
});
