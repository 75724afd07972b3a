import { z } from 'zod';
import { SAW_RANGES, USUAL_SAW, type SawTerms } from '@/takeoff/cutting-cost';

/** What somebody typed of their saw and their hour, kept on this device: it is the firm's own, not the floor's. */
const KEY = 'evenlay:saw-terms';

const within = ([least, most]: readonly [number, number]) => z.number().min(least).max(most);

const termsSchema = z.object({
  pace: within(SAW_RANGES.pace),
  minutesACut: within(SAW_RANGES.minutesACut),
  vibration: within(SAW_RANGES.vibration),
  hourMinor: z.number().int().min(0).nullable(),
});

export function keptSawTerms(): SawTerms {
  try {
    const read = termsSchema.safeParse(JSON.parse(localStorage.getItem(KEY) ?? 'null'));
    return read.success ? read.data : USUAL_SAW;
  } catch {
    return USUAL_SAW;
  }
}

export function keepSawTerms(terms: SawTerms): void {
  try {
    localStorage.setItem(KEY, JSON.stringify(terms));
  } catch {
    // They hold until the page is closed.
  }
}
