import { supplierChangeSchema } from '@/api-types/suppliers';
import { changeSupplier } from '@/server/catalogue/suppliers';
import { onlyMethods, writing } from '@/server/endpoint';

export const PATCH = writing(supplierChangeSchema, ({ db, actor, id }, change) =>
  changeSupplier(db, actor, id, change),
);
export const ALL = onlyMethods('PATCH');
