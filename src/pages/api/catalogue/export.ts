import { z } from 'zod';
import { exportCatalogue } from '@/server/catalogue/csv-export';
import { fetching, onlyMethods } from '@/server/endpoint';

export const GET = fetching(z.object({}), 'text/csv; charset=utf-8', ({ db, actor }) =>
  exportCatalogue(db, actor),
);
export const ALL = onlyMethods('GET');
