import { z } from 'zod';
import { minorSchema } from './catalogue';

/** Shares of a whole in hundredths of a per cent: 2000 is 20 %. */
const basisPoints = (what: string, most: number) =>
  z
    .number({ error: `Give ${what} as a number` })
    .int(`Give ${what} with at most two decimals`)
    .min(0, `${what[0].toUpperCase()}${what.slice(1)} cannot be less than 0`)
    .max(most, `${what[0].toUpperCase()}${what.slice(1)} is over ${most / 100} %`);

const line = (most: number) => z.string().trim().max(most, `Keep it to ${most} characters`);
const prefix = z
  .string()
  .trim()
  .max(12, 'Keep it to 12 characters')
  .regex(/^[\p{L}\p{N}/._ -]*$/u, 'Use letters, figures and / . _ - only');

export const taxBasisPoints = basisPoints('the tax rate', 10_000);
export const marginBasisPoints = basisPoints('the margin', 100_000);

/** A currency that this machine knows, ISO 4217. */
const currencySchema = z
  .string({ error: 'Choose a currency' })
  .regex(/^[A-Z]{3}$/, 'A currency is three capital letters, such as EUR')
  .refine(
    (code) => Intl.supportedValuesOf('currency').includes(code),
    'There is no such currency; write its three letters, such as EUR',
  );

/** What a firm's quotes and orders begin with. */
const fields = z.object({
  currency: currencySchema,
  /** What the tax is called, such as `VAT`. */
  taxName: line(30).min(1, 'Say what the tax is called'),
  taxBasisPoints,
  /** Worked out on each line, or once on the sum. */
  taxOn: z.enum(['lines', 'sum'], { error: 'Choose each line or the sum' }),
  /** Of cost, 25 % of 100 makes 125; of the price, 25 % of the price makes 133.33. */
  marginOf: z.enum(['cost', 'price'], { error: 'Choose of cost or of the price' }),
  marginBasisPoints,
  /** What an hour of work, or a square metre laid, costs the firm, without tax. */
  labourHourMinor: minorSchema,
  labourAreaMinor: minorSchema,
  validDays: z
    .number({ error: 'Give a number of days' })
    .int('Give whole days')
    .min(1, 'A quote holds for a day at least')
    .max(365, 'A quote holds for a year at most'),
  quoteTerms: line(4000),
  orderTerms: line(4000),
  quotePrefix: prefix,
  orderPrefix: prefix,
  address: line(500),
  phone: line(60),
  email: z
    .string()
    .trim()
    .toLowerCase()
    .max(254, 'That is too long for an e-mail address')
    .refine((text) => text === '' || z.email().safeParse(text).success, {
      error: 'That does not look like an e-mail address',
    }),
  /** The firm's number for the tax or in the register of companies, as it must stand on its papers. */
  registration: line(120),
  paper: z.enum(['A4', 'Letter'], { error: 'Choose A4 or Letter' }),
});

/** PATCH /api/firm/pricing, for owners. 200 → `FirmPricing`; 409 with `current` when it was changed since `revision`. */
export const firmPricingChangeSchema = fields
  .partial()
  .extend({ revision: z.number({ error: 'names no revision' }).int().min(0) });
export type FirmPricingChange = z.input<typeof firmPricingChangeSchema>;

/** GET /api/firm/pricing, for owners and designers. */
export interface FirmPricing extends z.output<typeof fields> {
  /** 0 until it is first changed. */
  readonly revision: number;
  /** Whether the currency may still be changed: once there are prices in it, it may not. */
  readonly currencyOpen: boolean;
}
