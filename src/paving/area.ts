import type { Display } from './length';

/** Exact by definition of the foot of 0.3048 m (NIST SP 811, B.8). */
export const M2_PER_SQUARE_FOOT = 0.09290304;

/** An area as text: `31.21 m²` or `335.9 ft²`. */
export function formatArea(squareMetres: number, display: Display): string {
  return display === 'metric'
    ? `${squareMetres.toFixed(squareMetres < 1000 ? 2 : 0)}\u202fm²`
    : `${(squareMetres / M2_PER_SQUARE_FOOT).toFixed(1)}\u202fft²`;
}
