import { z } from 'zod';

const fields = z.object({
  name: z
    .string({ error: 'Give the supplier’s name' })
    .trim()
    .min(1, 'Give the supplier’s name')
    .max(120, 'Keep the name to 120 characters'),
  email: z
    .string()
    .trim()
    .toLowerCase()
    .max(254, 'That is too long for an e-mail address')
    .refine((text) => text === '' || z.email().safeParse(text).success, {
      error: 'That does not look like an e-mail address',
    }),
  phone: z.string().trim().max(60, 'Keep it to 60 characters'),
  address: z.string().trim().max(500, 'Keep the address to 500 characters'),
  note: z.string().trim().max(1000, 'Keep the note to 1,000 characters'),
});

/** POST /api/suppliers. 201 → `Supplier`; 422 when there is one of that name. */
export const newSupplierSchema = fields.extend({
  email: fields.shape.email.default(''),
  phone: fields.shape.phone.default(''),
  address: fields.shape.address.default(''),
  note: fields.shape.note.default(''),
});
export type NewSupplier = z.input<typeof newSupplierSchema>;

/** PATCH /api/suppliers/{id}. 200 → `Supplier`; 409 with `current` when it was changed since `revision`. */
export const supplierChangeSchema = fields
  .extend({ retired: z.boolean() })
  .partial()
  .extend({ revision: z.number({ error: 'names no revision' }).int().min(1) });
export type SupplierChange = z.input<typeof supplierChangeSchema>;

/** GET /api/suppliers → `{ suppliers: Supplier[] }`, by name. */
export interface Supplier {
  readonly id: string;
  readonly revision: number;
  readonly name: string;
  readonly email: string;
  readonly phone: string;
  readonly address: string;
  readonly note: string;
  readonly retiredAt: string | null;
  /** How many items of the catalogue are theirs. */
  readonly items: number;
}
