import { z } from 'zod';
import type { PackMeasure } from '@/takeoff/price-list';
import { daySchema, minorSchema, packMeasures } from './catalogue';
import type { PersonName } from './people';
import type { FirmOnPaper, VersionOnPaper } from './quotes';

const purchaseLineSchema = z.object({
  /** Of the take-off's order that it serves, or one of its own. */
  id: z.string().min(1).max(200),
  /** The catalogue's entry; null for a line written by hand. */
  itemId: z.string().max(64).nullable(),
  name: z
    .string({ error: 'Name the line' })
    .trim()
    .min(1, 'Name the line')
    .max(160, 'Keep the name to 160 characters'),
  code: z.string().trim().max(60, 'Keep the code to 60 characters'),
  pack: z.object({
    name: z.string().trim().min(1, 'Say what is bought at once').max(60),
    holds: z.number().positive('A pack must hold more than 0').max(1_000_000),
    measure: z.enum(packMeasures),
    whole: z.boolean(),
  }),
  /** So many packs. */
  amount: z
    .number({ error: 'Give an amount' })
    .min(0, 'An amount cannot be less than 0')
    .max(1_000_000, 'That is over a million'),
  /** For one pack without tax, as expected; null when no price is named to the supplier. */
  costMinor: minorSchema.nullable(),
});
export interface PurchaseLine extends z.output<typeof purchaseLineSchema> {
  readonly pack: {
    readonly name: string;
    readonly holds: number;
    readonly measure: PackMeasure;
    readonly whole: boolean;
  };
}

/** PATCH /api/orders/{id}. 200 → `PurchaseOrder`; 409 with `current` when it was changed or sent since `revision`. */
export const orderChangeSchema = z
  .object({
    lines: z
      .array(purchaseLineSchema)
      .max(200, 'Keep it to 200 lines')
      .refine((lines) => new Set(lines.map(({ id }) => id)).size === lines.length, {
        error: 'has two lines of one id',
      }),
    deliveryDay: daySchema.nullable(),
    deliveryPlace: z.string().trim().max(500, 'Keep the address to 500 characters'),
    note: z.string().trim().max(2000, 'Keep the note to 2,000 characters'),
  })
  .partial()
  .extend({ revision: z.number({ error: 'names no revision' }).int().min(1) });
export type OrderChange = z.input<typeof orderChangeSchema>;

/**
 * POST /api/versions/{id}/orders: drafts from the version's take-off, one a supplier that has none yet; with a supplier, a draft
 * for that one again. 201 → `VersionOrders`.
 */
export const newOrdersSchema = z.object({ supplierId: z.string().min(1).max(64).optional() });

/**
 * POST /api/orders/{id}/send: numbers and freezes it and writes to the supplier, the order going with the letter as PDF and CSV. Once
 * only: 409 when it is sent already or was changed since `revision`. Orders that went for another version of the project must be known:
 * 409 with `elsewhere` while `besides` leaves one of them out. 200 → `PurchaseOrder`.
 */
export const orderSendSchema = z.object({
  revision: z.number({ error: 'names no revision' }).int().min(1),
  /** Ids of the orders for other versions of the project that the sender was shown. */
  besides: z.array(z.string().min(1).max(64)).max(10_000).default([]),
});

/** All that a sent order says, as it was sent. */
export interface SentOrder {
  readonly number: string;
  readonly firm: FirmOnPaper;
  readonly supplier: {
    readonly name: string;
    readonly email: string;
    readonly address: string;
  };
  readonly version: VersionOnPaper;
  readonly sentBy: string;
  readonly on: string;
  readonly currency: string;
  readonly lines: readonly PurchaseLine[];
  readonly deliveryDay: string | null;
  readonly deliveryPlace: string;
  readonly note: string;
  readonly terms: string;
  readonly paper: 'A4' | 'Letter';
}

/** GET /api/orders/{id}. */
export interface PurchaseOrder {
  readonly id: string;
  readonly versionId: string;
  readonly state: 'draft' | 'sent';
  readonly number: string | null;
  readonly revision: number;
  readonly supplier: { readonly id: string; readonly name: string; readonly email: string };
  readonly lines: readonly PurchaseLine[];
  readonly deliveryDay: string | null;
  readonly deliveryPlace: string;
  readonly note: string;
  readonly currency: string;
  /** Of the lines that have a cost, without tax. */
  readonly costMinor: number;
  readonly createdAt: string;
  readonly sentAt: string | null;
  readonly sentBy: PersonName | null;
  /** What became of its letter; null while it is a draft. */
  readonly letter: 'waiting' | 'sent' | 'refused' | null;
}

/** An order that went for another version of the project. */
export interface OrderElsewhere {
  readonly id: string;
  readonly number: string;
  readonly supplier: string;
  readonly email: string;
  readonly sentAt: string;
  readonly sentBy: string;
  readonly versionId: string;
  readonly versionNumber: number;
  readonly layoutName: string;
}

/** GET /api/versions/{id}/orders. */
export interface VersionOrders {
  readonly orders: readonly PurchaseOrder[];
  /** What the take-off says to buy that no supplier of the catalogue sells yet, by name. */
  readonly unsupplied: readonly string[];
  /** What was sent for other versions of the project, newest first: sending more orders on top of it. */
  readonly elsewhere: readonly OrderElsewhere[];
}
