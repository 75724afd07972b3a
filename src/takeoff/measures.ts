import { formatArea } from '@/paving/area';
import { formatCount } from '@/paving/count';
import { MM_PER_FOOT, type Display } from '@/paving/length';
import { smallFigure } from '@/paving/small-figure';
import { M3_PER_CUBIC_YARD } from '@/paving/volume';

/**
 * Volumes, masses and densities between metric and US measures, and as text. Every factor is exact by
 * the definitions of the foot (0.3048 m) and the pound (0.45359237 kg): NIST SP 811, appendix B.8.
 */

export const M_PER_FOOT = MM_PER_FOOT / 1000;
/** Exact: 0.3048³. */
export const M3_PER_CUBIC_FOOT = 0.028316846592;
export { M3_PER_CUBIC_YARD };
/** Exact: the international pound of 1959. */
export const KG_PER_POUND = 0.45359237;
/** Exact: 2,000 lb. */
export const KG_PER_SHORT_TON = 907.18474;
/** Exact. */
export const KG_PER_TONNE = 1000;
/** 1 lb/ft³ in kg/m³. */
export const POUNDS_PER_CUBIC_FOOT = KG_PER_POUND / M3_PER_CUBIC_FOOT;
const CUBIC_FEET_PER_CUBIC_YARD = 27;
const POUNDS_PER_SHORT_TON = 2000;

const THIN = '\u202f';

/** A figure in so many places, thousands parted: `1 602`, `12.4`. */
export function formatFigure(value: number, decimals: number): string {
  const [whole, part] = Math.abs(value).toFixed(decimals).split('.');
  const sign = value < 0 && Number(value.toFixed(decimals)) !== 0 ? '−' : '';
  return `${sign}${formatCount(Number(whole))}${part ? `.${part}` : ''}`;
}

/** A volume as a formula needs it: `0.605 m³`, `12.40 m³`; `21.70 ft³`, `45.30 ft³ (1.68 yd³)`. */
export function formatWorkedVolume(m3: number, display: Display): string {
  if (display === 'metric') {
    return `${m3 < 10 ? smallFigure(m3, 3, 0.01) : formatFigure(m3, 2)}${THIN}m³`;
  }
  const feet = m3 / M3_PER_CUBIC_FOOT;
  const figures = `${feet < 1 ? smallFigure(feet, 2, 0.1) : formatFigure(feet, 2)}${THIN}ft³`;
  if (feet < CUBIC_FEET_PER_CUBIC_YARD) return figures;
  return `${figures} (${formatFigure(m3 / M3_PER_CUBIC_YARD, 2)}${THIN}yd³)`;
}

/** `24.3 kg`, `1.07 t`; `53.6 lb`, `1.18 short tons`. */
export function formatMass(kg: number, display: Display): string {
  if (display === 'metric') {
    if (kg < KG_PER_TONNE) {
      return `${kg < 100 ? smallFigure(kg, 1, 1) : formatFigure(kg, 0)}${THIN}kg`;
    }
    return `${formatFigure(kg / KG_PER_TONNE, 2)}${THIN}t`;
  }
  const pounds = kg / KG_PER_POUND;
  if (pounds < POUNDS_PER_SHORT_TON) {
    return `${pounds < 100 ? smallFigure(pounds, 1, 1) : formatFigure(pounds, 0)}${THIN}lb`;
  }
  return `${formatFigure(pounds / POUNDS_PER_SHORT_TON, 2)}${THIN}short tons`;
}

/** `1 602 kg/m³`, `100 lb/ft³`. */
export function formatDensity(kgPerM3: number, display: Display): string {
  return display === 'metric'
    ? `${formatFigure(kgPerM3, 0)}${THIN}kg/m³`
    : `${formatFigure(kgPerM3 / POUNDS_PER_CUBIC_FOOT, 1)}${THIN}lb/ft³`;
}

/** Along an edge: `24.60 m`, `80.7 ft`. */
export function formatRun(metres: number, display: Display): string {
  return display === 'metric'
    ? `${formatFigure(metres, 2)}${THIN}m`
    : `${formatFigure(metres / M_PER_FOOT, 1)}${THIN}ft`;
}

/** Whatever a take-off counts, as text; `each` is a bare count. */
export function formatAmount(
  amount: number,
  measure: 'each' | 'm' | 'm2' | 'm3' | 'kg',
  display: Display,
): string {
  switch (measure) {
    case 'each':
      return formatCount(amount);
    case 'm':
      return formatRun(amount, display);
    case 'm2':
      return formatArea(amount, display);
    case 'm3':
      return formatWorkedVolume(amount, display);
    case 'kg':
      return formatMass(amount, display);
  }
}
