import { formatCount } from './count';
import type { Display } from './length';
import { smallFigure } from './small-figure';

/** Exact by definition of the foot of 0.3048 m (NIST SP 811, B.8: 7.645 549 E-01). */
export const M3_PER_CUBIC_YARD = 0.764554857984;

/** A smaller volume keeps three significant figures, m³ or yd³. */
const SMALL_VOLUME = 0.1;

/** A volume as text: `3.12 m³` or `4.08 yd³`; `0.0456 m³` where two decimals would read as nought. */
export function formatVolume(cubicMetres: number, display: Display): string {
  const value = display === 'metric' ? cubicMetres : cubicMetres / M3_PER_CUBIC_YARD;
  const figures = Math.abs(value) < 1000 ? smallFigure(value, 2, SMALL_VOLUME) : formatCount(value);
  return `${figures}\u202f${display === 'metric' ? 'm³' : 'yd³'}`;
}
