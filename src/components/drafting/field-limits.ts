import { GREATEST_COORDINATE_MM, GREATEST_UNIT_MM } from '@/paving/layout-document';

/** What the document would not hold is stopped at the field, so that what was typed is never refused later. */

/** A floor's coordinates may be negative, but not lie beyond what the document takes. */
export const coordinateRefused = (mm: number): string | null =>
  Math.abs(mm) > GREATEST_COORDINATE_MM ? 'That is more than 100 km away.' : null;

/** A length within a bond, in either direction. */
export const lengthRefused = (mm: number): string | null =>
  Math.abs(mm) > GREATEST_UNIT_MM ? 'That is over 10 m.' : null;

/** An edge may be as long as a kilometre, and must be long enough to be measured, mm. */
export const EDGE_MM = { least: 1, greatest: 1_000_000 } as const;

export const edgeRefused = (mm: number): string | null =>
  mm < EDGE_MM.least
    ? 'A side must be at least 1 mm long.'
    : mm > EDGE_MM.greatest
      ? 'That is over a kilometre.'
      : null;
