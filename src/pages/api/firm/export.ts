import { z } from 'zod';
import { firmArchive } from '@/server/archive/firm-archive';
import { onlyMethods, streaming } from '@/server/endpoint';

/** Everything of the firm as one ZIP archive, for its owners. */
export const GET = streaming(
  z.object({}),
  'application/zip',
  ({ db, actor }) => firmArchive(db, actor),
  {
    'content-disposition': 'attachment; filename="evenlay-firm.zip"',
  },
);
export const ALL = onlyMethods('GET');
