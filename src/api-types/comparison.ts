import { z } from 'zod';
import type { FigureComparison } from '@/paving/figure-comparison';
import type { VersionDetail } from './versions';

/**
 * GET /api/comparison?a={version}&b={version} → `VersionComparison`. Both must be versions that the person sees,
 * of one project: 422 `invalid` otherwise. Which unit is which is worked out where it is drawn, by
 * `floorComparison` of the two documents.
 */
export const comparisonQuerySchema = z.object({
  a: z.string({ error: 'names no version' }).min(1, 'names no version'),
  b: z.string({ error: 'names no version' }).min(1, 'names no version'),
});

export interface VersionComparison {
  readonly a: VersionDetail;
  readonly b: VersionDetail;
  readonly units: {
    readonly kept: number;
    readonly moved: number;
    readonly gone: number;
    readonly added: number;
  };
  readonly figures: FigureComparison;
}
