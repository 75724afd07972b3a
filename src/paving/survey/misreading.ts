import { MM_PER_FOOT, MM_PER_INCH, type Display } from '../length';

/** Ways in which tapes are misread: common practice. */
export type Misreading = 'digits swapped' | 'burned tape' | 'miscounted' | 'one digit';

/** Readings agree with a guess when they do so to this, mm, besides what the tapes around it may be out. */
const NEAR_MM = 3;

/** What rounding may take from a whole foot or inch, as a share of it. */
const TRIFLE = 1e-6;

const digitsOf = (length: number): number[] => [...String(Math.round(length))].map(Number);
const valueOf = (digits: readonly number[]): number => Number(digits.join(''));

/**
 * How a tape that reads `read` may have been misread, when the others say that it should be `should`, to
 * `within` mm: the likeliest first of swapped digits, a tape held at its 100 mm or 1 ft mark
 * rather than at its end, a whole metre or foot, one digit wrong. Null when none of these would explain it.
 */
export function misreading(
  read: number,
  should: number,
  within: number,
  display: Display,
): Misreading | null {
  const near = (value: number) => Math.abs(value - should) <= NEAR_MM + within;
  if (near(read)) return null;
  if (display === 'metric') {
    const digits = digitsOf(read);
    for (let n = 0; n + 1 < digits.length; n++) {
      const swapped = [...digits];
      [swapped[n], swapped[n + 1]] = [digits[n + 1], digits[n]];
      if (digits[n] !== digits[n + 1] && near(valueOf(swapped))) return 'digits swapped';
    }
    if (near(read - 100)) return 'burned tape';
    if (near(read - 1000) || near(read + 1000)) return 'miscounted';
    for (let n = 0; n < digits.length - 1; n++)
      for (let digit = 0; digit < 10; digit++)
        if (near(valueOf(digits.map((own, at) => (at === n ? digit : own))))) return 'one digit';
    return null;
  }
  if (near(read - MM_PER_FOOT)) return 'burned tape';
  if (near(read + MM_PER_FOOT)) return 'miscounted';
  if (near(read - MM_PER_INCH)) return 'burned tape';
  // Feet and inches read as one another: 6' 8" for 8' 6".
  const feet = Math.floor(read / MM_PER_FOOT + TRIFLE);
  const inches = Math.floor((read % MM_PER_FOOT) / MM_PER_INCH + TRIFLE);
  const rest = read - feet * MM_PER_FOOT - inches * MM_PER_INCH;
  if (feet < 12 && near(inches * MM_PER_FOOT + feet * MM_PER_INCH + rest)) return 'digits swapped';
  return null;
}
