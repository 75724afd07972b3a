import { formatCount } from '@/paving/count';

/** Reduction scales recommended by ISO 5455, as denominators: 1:1, 1:2, 1:5, 1:10 … */
export const PREFERRED_SCALES: readonly number[] = [1, 10, 100, 1000, 10_000].flatMap((power) =>
  [1, 2, 5].map((step) => step * power),
);

/** The largest preferred scale at which `lengthMm` by `widthMm` of ground fits, or the smallest there is. */
export function scaleFitting(
  lengthMm: number,
  widthMm: number,
  paperLength: number,
  paperWidth: number,
): number {
  const fits = (scale: number) => lengthMm / scale <= paperLength && widthMm / scale <= paperWidth;
  return PREFERRED_SCALES.find(fits) ?? PREFERRED_SCALES[PREFERRED_SCALES.length - 1];
}

/** A scale as it is written, `1:20`. */
export const scaleName = (denominator: number): string => `1:${formatCount(denominator)}`;
