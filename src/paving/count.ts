/** Between thousands; it does not break across lines. The same space as in lengths. */
const THIN = '\u202f';
const MINUS = '−';

/** A whole number as text, its thousands parted: `1 373`. A fraction is rounded off. */
export function formatCount(count: number): string {
  const whole = Math.round(count);
  const figures = String(Math.abs(whole)).replace(/\B(?=(\d{3})+$)/g, THIN);
  return `${whole < 0 ? MINUS : ''}${figures}`;
}
