import { z } from 'zod';
import type { PriceList } from '@/takeoff/price-list';
import type { Quote } from '@/takeoff/quote';
import type { TakeOff } from '@/takeoff/take-off';
import { minorSchema } from './catalogue';
import type { PersonName } from './people';
import { marginBasisPoints, taxBasisPoints } from './pricing';

/** GET /api/versions/{id}/pricing, for those who see costs; 404 for a version saved before prices were kept. */
export interface VersionPricing {
  readonly versionId: string;
  readonly takeOff: TakeOff;
  readonly priceList: PriceList;
  readonly at: string;
}

export const quoteGroups = ['materials', 'labour', 'other'] as const;
export type QuoteGroup = (typeof quoteGroups)[number];

const amount = z
  .number({ error: 'Give an amount' })
  .min(0, 'An amount cannot be less than 0')
  .max(10_000_000, 'That is over ten million');

const quoteLineSchema = z.object({
  id: z.string().min(1).max(200),
  group: z.enum(quoteGroups, { error: 'Choose materials, labour or other' }),
  name: z
    .string({ error: 'Name the line' })
    .trim()
    .min(1, 'Name the line')
    .max(160, 'Keep the name to 160 characters'),
  amount,
  measure: z.string().trim().max(60, 'Keep it to 60 characters'),
  /** What one costs the firm, without tax; null while nobody has said. */
  costMinor: minorSchema.nullable(),
});
export type QuoteDraftLine = z.output<typeof quoteLineSchema>;

/** Of a margin of the price, basis points: the whole price would leave no cost. */
const GREATEST_OF_PRICE = 9000;
/** Of one line's cost, minor units: with margin and tax, 300 such still add up exactly. */
const GREATEST_LINE_MINOR = 1_000_000_000_000;

const draftFields = z.object({
  lines: z
    .array(quoteLineSchema)
    .max(300, 'Keep it to 300 lines')
    .refine((lines) => new Set(lines.map(({ id }) => id)).size === lines.length, {
      error: 'has two lines of one id',
    })
    .refine(
      (lines) =>
        lines.every(({ amount, costMinor }) => amount * (costMinor ?? 0) <= GREATEST_LINE_MINOR),
      { error: 'has a line of more money than Evenlay can work with' },
    ),
  margin: z
    .object({ of: z.enum(['cost', 'price']), share: marginBasisPoints })
    .refine(({ of, share }) => of === 'cost' || share <= GREATEST_OF_PRICE, {
      error: 'A margin of the price is at most 90 %',
      path: ['share'],
    }),
  tax: z.object({
    name: z.string().trim().min(1, 'Say what the tax is called').max(30),
    share: taxBasisPoints,
    on: z.enum(['lines', 'sum']),
  }),
  validDays: z
    .number({ error: 'Give a number of days' })
    .int('Give whole days')
    .min(1, 'A quote holds for a day at least')
    .max(365, 'A quote holds for a year at most'),
  /** The total is rounded to so many of the currency's smallest coin. */
  roundTo: z
    .number({ error: 'Choose what the total is rounded to' })
    .int('Choose what the total is rounded to')
    .min(1, 'Choose what the total is rounded to')
    .max(10_000, 'That is too much to round by'),
  /** To the client, over the lines. */
  note: z.string().trim().max(2000, 'Keep the note to 2,000 characters'),
  terms: z.string().trim().max(4000, 'Keep the terms to 4,000 characters'),
});
export type QuoteDraft = z.output<typeof draftFields>;

/** PATCH /api/quotes/{id}: a draft's fields. 200 → `QuoteDetail`; 409 with `current` when it was changed or sent since `revision`. */
export const quoteChangeSchema = draftFields
  .partial()
  .extend({ revision: z.number({ error: 'names no revision' }).int().min(1) });
/**
 * POST /api/quotes/{id}/send: numbers and freezes it, shows its totals to the project’s clients and writes to them with the quote as
 * a PDF. 200 → `QuoteSent`; 409 when it was changed since `revision`, is sent already, or the version is not shared yet.
 */
export const quoteSendSchema = z.object({
  revision: z.number({ error: 'names no revision' }).int().min(1),
});

export interface QuoteSent extends QuoteDetail {
  /** Clients to whom it was written: none where no client is on the project, or none of them wants letters. */
  readonly written: number;
}

/** Who a quote or order comes from, as it stood when it was sent. */
export interface FirmOnPaper {
  readonly name: string;
  readonly address: string;
  readonly phone: string;
  readonly email: string;
  readonly registration: string;
}

/** The version that a quote or order is for. */
export interface VersionOnPaper {
  readonly projectName: string;
  readonly layoutName: string;
  readonly number: number;
  readonly label: string;
  readonly shortFingerprint: string;
}

/** All that a sent quote says, as it was sent. */
export interface SentQuote {
  readonly number: string;
  readonly firm: FirmOnPaper;
  readonly clientName: string;
  readonly version: VersionOnPaper;
  readonly sentBy: string;
  readonly groups: Readonly<Record<string, QuoteGroup>>;
  readonly quote: Quote;
  readonly note: string;
  readonly terms: string;
  readonly tax: QuoteDraft['tax'];
  readonly paper: 'A4' | 'Letter';
}

/** GET /api/quotes/{id}, for those who see costs. */
export interface QuoteDetail {
  readonly id: string;
  readonly versionId: string;
  readonly state: 'draft' | 'sent';
  readonly number: string | null;
  readonly revision: number;
  readonly draft: QuoteDraft;
  /** Worked out by the server; of a draft as of today. Lines without a cost count nothing and are in `unpriced`. */
  readonly quote: Quote;
  readonly unpriced: readonly string[];
  readonly createdAt: string;
  readonly createdBy: PersonName;
  readonly sentAt: string | null;
  readonly sentBy: PersonName | null;
}

/** What a client sees of a quote: what is in it and its totals, neither cost nor margin. */
export interface QuoteTotals {
  readonly id: string;
  readonly number: string;
  readonly sentAt: string;
  readonly validUntil: string;
  /** Whether another quote of this version was sent after it. */
  readonly replaced: boolean;
  readonly currency: string;
  readonly taxName: string;
  readonly netMinor: number;
  readonly taxMinor: number;
  readonly totalMinor: number;
  readonly note: string;
}

/** A client on a quote's project. */
export interface QuoteReader {
  readonly name: string;
  /** Whether a letter goes to them as well; some take none. */
  readonly byLetter: boolean;
}

/**
 * GET /api/versions/{id}/quotes → `{ quotes }`, newest first: `QuoteDetail` in full for those who see costs, totals of what is
 * sent for clients (`totals`). POST makes a draft from the version's take-off, or answers with the one there is. 201 → `QuoteDetail`.
 */
export interface VersionQuotes {
  /** Empty for clients. */
  readonly quotes: readonly QuoteDetail[];
  readonly totals: readonly QuoteTotals[];
  /** The clients on the project, by name, to whom a quote would go; empty for clients. */
  readonly clients: readonly QuoteReader[];
}
