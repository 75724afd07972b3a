import { z } from 'zod';
import type { TypedPrice } from '@/takeoff/price-list';
import { minorSchema, packMeasures } from './catalogue';

/**
 * GET /api/layouts/{id}/price-list → `PriceList`: what the catalogue offers today, what the layout's draft names that it offers no
 * longer, and what was typed for the layout. PUT keeps the price of one order, for things that the catalogue has no price of, or with
 * null takes it away. 200 → `LayoutPrices`. Both for those who see costs.
 */
export const layoutPriceSchema = z.object({
  orderId: z.string({ error: 'names no order' }).min(1, 'names no order').max(200),
  price: z
    .object({
      costMinor: minorSchema,
      pack: z.object({
        holds: z
          .number({ error: 'Give what the pack holds' })
          .positive('A pack must hold more than 0')
          .max(1_000_000_000),
        measure: z.enum(packMeasures),
      }),
    })
    .nullable(),
});
export type LayoutPriceSet = z.input<typeof layoutPriceSchema>;

export interface LayoutPrices {
  readonly typed: readonly TypedPrice[];
}
