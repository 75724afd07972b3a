import { newSupplierSchema } from '@/api-types/suppliers';
import { addSupplier, listSuppliers } from '@/server/catalogue/suppliers';
import { onlyMethods, reading, writing } from '@/server/endpoint';

export const GET = reading(({ db, actor }) => listSuppliers(db, actor));
export const POST = writing(
  newSupplierSchema,
  ({ db, actor }, input) => addSupplier(db, actor, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
