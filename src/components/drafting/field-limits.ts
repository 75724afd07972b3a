import { GREATEST_COORDINATE_MM, GREATEST_UNIT_MM } from '@/paving/layout-document';
import { formatLength, type Display } from '@/paving/length';

/** What the document would not hold is stopped at the field, so that what was typed is never refused later. */

/** A floor's coordinates may be negative, but not lie beyond what the document takes. */
export const coordinateRefused = (mm: number): string | null =>
  Math.abs(mm) > GREATEST_COORDINATE_MM ? 'That is more than 100 km (62 miles) away.' : null;

/** Refuses a length outside these bounds, mm, and says in the person's own measure what would do. */
export const lengthWithin =
  (display: Display, least: number, greatest: number) =>
  (mm: number): string | null => {
    const shown = (bound: number) => formatLength(bound, display, { decimals: 1 });
    return mm < least
      ? `At least ${shown(least)}.`
      : mm > greatest
        ? `At most ${shown(greatest)}.`
        : null;
  };

/** The side of a unit, or what a tape reads. */
export const sizeWithin = (display: Display, greatest: number) => (mm: number) =>
  mm <= 0 ? 'Must be more than 0.' : lengthWithin(display, 0, greatest)(mm);

/** A joint, a gap or a clearance. */
export const gapRefused = (display: Display) => lengthWithin(display, 0, GREATEST_UNIT_MM);

/** A length within a bond, in either direction. */
export const stepRefused = (display: Display) =>
  lengthWithin(display, -GREATEST_UNIT_MM, GREATEST_UNIT_MM);

/** An edge may be as long as a kilometre, and must be long enough to be measured, mm. */
export const EDGE_MM = { least: 1, greatest: 1_000_000 } as const;

export const edgeRefused = (mm: number): string | null =>
  mm < EDGE_MM.least
    ? 'A side must be at least 1 mm long.'
    : mm > EDGE_MM.greatest
      ? 'A side is at most 1 km (3,280 ft) long.'
      : null;
