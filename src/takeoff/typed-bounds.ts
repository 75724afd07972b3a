import { MM_PER_INCH, formatLength } from '@/paving/length';
import { KG_PER_POUND, POUNDS_PER_CUBIC_FOOT, formatFigure } from './measures';

/** A bound of the document's schema that a value has passed, in the schema's own measure. */
export interface PassedBound {
  readonly side: 'least' | 'most';
  readonly value: number;
}

/** US units in which the last key of a field is typed, and to how many decimals its bounds are said. */
const US_UNITS: readonly {
  readonly keys: readonly string[];
  readonly size: number;
  readonly decimals: number;
  readonly words: (figure: number) => string;
}[] = [
  {
    keys: ['density', 'unitDensity'],
    size: POUNDS_PER_CUBIC_FOOT,
    decimals: 1,
    words: (figure) => `${formatFigure(figure, 1)}\u202flb/ft³`,
  },
  {
    keys: ['bag', 'bulkBag', 'load'],
    size: KG_PER_POUND,
    decimals: 1,
    words: (figure) => `${formatFigure(figure, 1)}\u202flb`,
  },
  {
    keys: ['depth', 'lap', 'rollWidth'],
    size: MM_PER_INCH,
    decimals: 0,
    words: (figure) =>
      figure === 0 ? '0' : formatLength(figure * MM_PER_INCH, 'imperial', { decimals: 1 }),
  },
];

/**
 * A bound in US units, rounded towards what is allowed, so that the figure said is one that would do; null
 * for a plain number, whose bounds are the same in any measure.
 */
export function usBoundWords(
  field: readonly string[],
  { side, value }: PassedBound,
): string | null {
  const unit = US_UNITS.find(({ keys }) => keys.includes(field[field.length - 1]));
  if (!unit) return null;
  const parts = 10 ** unit.decimals;
  const size = (value / unit.size) * parts;
  const figure = (side === 'least' ? Math.ceil(size - 1e-9) : Math.floor(size + 1e-9)) / parts;
  if (side === 'most') return `Must be at most ${unit.words(figure)}.`;
  return `Must be ${figure === 0 ? 'more than' : 'at least'} ${unit.words(figure)}.`;
}
