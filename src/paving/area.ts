import { formatCount } from './count';
import type { Display } from './length';
import { smallFigure } from './small-figure';

/** Exact by definition of the foot of 0.3048 m (NIST SP 811, B.8). */
export const M2_PER_SQUARE_FOOT = 0.09290304;

/** A smaller area keeps three significant figures, m². */
const SMALL_AREA = 0.1;

/** An area as text: `31.21 m²` or `335.9 ft²`; `0.0006 m²` where two decimals would read as nought. */
export function formatArea(squareMetres: number, display: Display): string {
  if (display === 'imperial') {
    const figures = smallFigure(
      squareMetres / M2_PER_SQUARE_FOOT,
      1,
      SMALL_AREA / M2_PER_SQUARE_FOOT,
    );
    return `${figures}\u202fft²`;
  }
  const figures =
    squareMetres < 1000 ? smallFigure(squareMetres, 2, SMALL_AREA) : formatCount(squareMetres);
  return `${figures}\u202fm²`;
}
