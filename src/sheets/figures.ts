import type { Display } from '@/paving/length';
import { lengthParts } from '@/paving/length';
import { sheetText } from './text-measure';

const OVER = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const UNDER = '₀₁₂₃₄₅₆₇₈₉';
/** Between feet and inches: a line must not break there. */
const FEET_SPACE = '\u00a0';
const raised = (value: number, digits: string): string =>
  [...String(value)].map((digit) => digits[Number(digit)]).join('');

/**
 * A length as drawings figure it: millimetres without their unit (`7 200`), or feet, inches and
 * sixteenths with the fraction set as one (`23' 7⁷⁄₁₆"`).
 */
export function figureText(mm: number, display: Display, decimals = 0): string {
  const parts = lengthParts(mm, display, decimals);
  const fraction = parts.fraction
    ? `${raised(parts.fraction[0], OVER)}⁄${raised(parts.fraction[1], UNDER)}`
    : '';
  const between = /\d$/.test(parts.figures) ? '' : parts.figures === '' ? '' : FEET_SPACE;
  const unit = display === 'imperial' ? parts.unit : '';
  return sheetText(
    `${parts.negative ? '−' : ''}${parts.figures.replace(' ', FEET_SPACE)}${fraction ? between + fraction : ''}${unit}`,
  );
}

/** A level over the datum with its sign: `−12`, `0`, `+5`. */
export function levelFigureText(mm: number, display: Display): string {
  const figure = figureText(mm, display);
  return mm > 0 && figure !== figureText(0, display) ? `+${figure}` : figure;
}

/** A length with its unit, for running text: `6 mm`. */
export function lengthText(mm: number, display: Display, decimals = 0): string {
  const figure = figureText(mm, display, decimals);
  return display === 'metric' ? `${figure}\u2009mm` : figure;
}

/** Least to greatest, as `11–26`, or one figure when they print alike. */
export function rangeText(least: number, greatest: number, display: Display): string {
  const [from, to] = [figureText(least, display), figureText(greatest, display)];
  return from === to ? from : `${from}–${to}`;
}
