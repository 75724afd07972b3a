import { CATALOGUE_FILE_LIMIT, importQuerySchema } from '@/api-types/catalogue';
import { importCatalogue } from '@/server/catalogue/csv-import';
import { onlyMethods, receiving } from '@/server/endpoint';

export const POST = receiving(
  importQuerySchema,
  { bytes: CATALOGUE_FILE_LIMIT, words: 'The file is over 4 MB. Part it in two.' },
  ({ db, actor }, query, file) => importCatalogue(db, actor, query, file),
  200,
);
export const ALL = onlyMethods('POST');
