import { z } from 'zod';
import { STATUSES } from '@/lib/domain/orders/facts';

const instant = z.iso.datetime({ offset: true });
const day = z.iso.date();
const length = z.int().describe('Whole nanometres');
const punch = z.enum(['met', 'unmet', 'not_needed']);
const punches = z.strictObject({ price: punch, parts: punch, sizes: punch });
const status = z.enum(STATUSES);
const clock = z.enum(['none', 'sender', 'partner', 'road', 'snag']);
const side = z.enum(['sender', 'partner']);

/** An order in a list. */
export const workOrderAnswer = z.strictObject({
  orderId: z.uuid(),
  number: z.int(),
  side: side.describe('Which side of the order one is on'),
  otherShop: z.string().nullable(),
  title: z.string(),
  status,
  step: z.string().nullable().describe('What one’s own shop can and should do now'),
  theirStep: z.string().nullable(),
  clock: clock.describe('Where the hours are booked now'),
  clockSince: instant,
  neededBackOn: day.nullable(),
  promisedOn: day.nullable(),
  punches,
  stopped: z.boolean(),
  clear: z.boolean().describe('Every line may be cut'),
  unread: z.int().describe('Messages that one has not seen'),
});

export const workOrdersAnswer = z.strictObject({
  orders: z.array(workOrderAnswer),
  next: z.string().nullable().describe('The address of the next page'),
});

const limits = z.strictObject({ target: length, lower: length, upper: length });

/** One order with its sizes, as far as one may see it. */
export const orderAnswer = z.strictObject({
  id: z.uuid(),
  number: z.int(),
  version: z.int(),
  status,
  round: z.int(),
  side,
  title: z.string(),
  engine: z.string(),
  sender: z.string(),
  partner: z.string().nullable(),
  currency: z.string(),
  notes: z.string(),
  standingInstruction: z.string(),
  step: z.string().nullable(),
  theirStep: z.string().nullable(),
  clock,
  punches,
  stopped: z.boolean(),
  clear: z.boolean(),
  neededBackOn: day.nullable(),
  promisedOn: day.nullable(),
  agreedMinor: z.int().nullable().describe('The agreed price of the work, in minor units'),
  latestRev: z.int().nullable(),
  lines: z.array(
    z.strictObject({
      id: z.uuid(),
      operation: z.string(),
      title: z.string(),
      needsSizes: z.boolean(),
      started: z.boolean(),
      clear: z.boolean(),
    }),
  ),
  parts: z.array(
    z.strictObject({ id: z.uuid(), kind: z.string(), pieces: z.int(), stamps: z.array(z.string()) }),
  ),
  sizes: z.array(
    limits.extend({
      lineId: z.uuid(),
      since: z.int().describe('The rev since which these limits stand'),
      feature: z.string(),
      what: z.string(),
      cutting: z.enum(['smaller', 'bigger', 'one_limit']),
      partner: limits.nullable().describe('The same limits in the partner’s unit, rounded inward'),
    }),
  ),
});

/** Readings and decisions of an order. */
export const readingsAnswer = z.strictObject({
  readings: z.array(
    z.strictObject({
      id: z.uuid(),
      lineId: z.uuid(),
      side,
      purpose: z.enum(['found', 'cut', 'check']),
      stage: z.enum(['found', 'cut', 'finished']),
      round: z.int(),
      rev: z.int().nullable(),
      feature: z.string(),
      position: z.string(),
      typedText: z.string(),
      size: length,
      author: z.string(),
      marks: z.array(z.string()),
      takenAt: instant,
      partMc: z.int().nullable().describe('Temperature of the part, thousandths of a degree Celsius'),
      instrument: z.string(),
    }),
  ),
  decisions: z.array(
    z.strictObject({
      lineId: z.uuid(),
      round: z.int(),
      decision: z.enum(['accept', 'as_is', 'send_back', 'reject']),
      reason: z.string(),
      features: z.array(z.string()).describe('None means the whole line'),
      author: z.string(),
    }),
  ),
});

export const keptAnswer = z.strictObject({ kept: z.array(z.uuid()).describe('Ids that were new') });
export const draftAnswer = z.strictObject({ id: z.uuid(), version: z.int() });
export const versionAnswer = z.strictObject({ version: z.int() });
export const seenAnswer = z.strictObject({ seen: z.int() });
export const fileAnswer = z.strictObject({ id: z.uuid() });

/** RFC 9457. */
export const problemAnswer = z.looseObject({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  errors: z.array(z.strictObject({ pointer: z.string(), detail: z.string() })).optional(),
});
